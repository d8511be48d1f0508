import type { Cause } from '../../types.ts';

/** Spark, and the signals it is timed by. */
export const ignitionCauses = {
  'plugs-wet': {
    name: 'Engine flooded, plugs wet',
    part: 'plugs (dry them), then what flooded it',
    because: 'Wet plugs short the spark to ground.',
    weight: { 'cranks-no-start': 3, misfire: 1 },
    proof: [['plugs-look:wet', 'plugs-dried:starts']],
    prove: 'The plugs come out wet, and with dry plugs and cleared cylinders it starts.',
  },
  plugs: {
    name: 'Plugs worn, fouled or cracked',
    part: 'plugs',
    because: 'Too wide a gap or a path over the insulator takes the spark.',
    weight: { 'cranks-no-start': 2, misfire: 5 },
    proof: [['plugs-look:worn']],
    prove: 'Gap far off the figure, fouled or cracked insulator; another plug in that cylinder runs.',
  },
  secondary: {
    name: 'Leads, cap, rotor or coil boot',
    part: 'secondary parts',
    because: 'The high voltage does not reach the plugs or leaks away.',
    weight: { 'cranks-no-start': 2, misfire: 4 },
    proof: [['secondary-look:bad']],
    prove: 'A crack, a burnt track, or a resistance far off the figure.',
  },
  coil: {
    name: 'Ignition coil',
    part: 'coil',
    because: 'Feed and command arrive and no high voltage leaves.',
    weight: { 'cranks-no-start': 2, misfire: 4, stall: 1 },
    proof: [
      ['coil-swap:follows'],
      ['coil-primary:no-kick', 'coil-feed:good', 'coil-command:pulses'],
      ['coil-current:none', 'coil-feed:good', 'coil-command:pulses'],
      ['coil-current:step'],
    ],
    prove:
      'Feed and command are good and no current flows or no kick comes, or the fault goes with the coil to another cylinder.',
  },
  'coil-feed': {
    name: 'Feed of the coils: their relay, fuse or wire',
    part: 'relay, fuse or wire of the coil feed',
    because: 'No battery voltage at the coil, so nothing can charge.',
    weight: { 'cranks-no-start': 3, stall: 1, misfire: 1 },
    proof: [
      ['coil-feed:missing', 'fuses:good', 'main-relay:output'],
      ['coil-feed:missing', 'coil-feed-trace:open'],
      ['coil-feed:missing', 'coil-command:pulses', 'coil-feed-cranking:lost'],
    ],
    prove:
      'No feed at the coil, key on and cranking, although the control unit is awake, or although fuse and main relay pass it.',
  },
  'coil-driver': {
    name: 'Coil driver, ignition module or command wire',
    part: 'driver, module or command wire',
    because: 'Crank signal and feed are there and the coil is not switched.',
    weight: { 'cranks-no-start': 2, misfire: 2, stall: 1 },
    proof: [['coil-command-wire:open'], ['coil-command-wire:module']],
    prove:
      'The command leaves the control unit and does not arrive, or arrives at the module and is not switched.',
  },
  'crank-sensor': {
    name: 'Crank sensor',
    part: 'crank sensor',
    because: 'Without its signal there is usually neither spark nor injection.',
    weight: { 'cranks-no-start': 5, stall: 5, misfire: 1 },
    proof: [
      ['crank-at-sensor:none', 'crank-supply:good', 'crank-look:good'],
      ['crank-at-sensor:none', 'crank-type:two-wire', 'crank-look:good'],
      ['crank-winding:off'],
      ['crank-heat:fails'],
    ],
    prove: 'Supply, ground, air gap and wheel are good, and no signal leaves the sensor itself.',
  },
  'crank-wiring': {
    name: 'Wiring or plug of the crank sensor',
    part: 'crank sensor wiring',
    because: 'The signal is made and is lost or broken on its way.',
    weight: { 'cranks-no-start': 3, stall: 4 },
    proof: [
      ['crank-at-sensor:there'],
      ['crank-supply:missing', 'reference:good'],
      ['crank-wiggle:breaks'],
      ['crank-trace:inverted'],
    ],
    prove:
      'Signal at the sensor and none at the control unit, a supply that does not arrive, a trace that breaks when the loom is moved, or one that is upside down against a known-good with the same lead order.',
  },
  'crank-gap': {
    name: 'Crank sensor loose, air gap wide or metal dust on it',
    part: 'sensor mounting',
    because: 'A wide gap or dust lowers every tooth until the control unit misses them.',
    weight: { 'cranks-no-start': 2, stall: 2 },
    proof: [['crank-look:gap']],
    prove: 'Seen loose, dirty or outside the figure; cleaned and set, the trace is whole.',
  },
  'crank-wheel': {
    name: 'Trigger wheel damaged, bent or moved',
    part: 'trigger wheel',
    because: 'A tooth out of place breaks the count at one place in every turn.',
    weight: { 'cranks-no-start': 1, stall: 1, misfire: 1 },
    proof: [['crank-look:wheel']],
    prove: 'The tooth that the trace names is seen chipped, bent or loose.',
  },
  'cam-sensor': {
    name: 'Cam sensor or its wiring',
    part: 'cam sensor or wiring',
    because: 'On many engines no injection without a cam signal, or a long crank until it guesses.',
    weight: { 'cranks-no-start': 3, stall: 1, misfire: 1 },
    proof: [
      ['cam-at-sensor:none', 'cranking:usual'],
      ['cam-at-sensor:none', 'belt-look:good'],
      ['cam-at-sensor:there'],
      ['cam-at-sensor:no-supply', 'reference:good'],
    ],
    prove: 'Crank and cam drive are good and the signal does not leave the sensor or does not arrive.',
  },
  'timing-slipped': {
    name: 'Timing belt or chain slipped',
    part: 'timing belt or chain',
    because: 'Valves and spark come at the wrong time.',
    weight: { 'cranks-no-start': 2, misfire: 2 },
    proof: [
      ['belt-look:slipped'],
      ['cam-phase:outside', 'compression:all-low'],
      ['cam-phase:outside', 'compression:one-low'],
    ],
    prove:
      'Timing marks do not line up by hand; or the cam is shifted against a known-good and the compression is low with it.',
  },
  'timing-broken': {
    name: 'Timing belt or chain broken',
    part: 'timing belt or chain',
    because: 'The cams stand still: no compression in any cylinder, it spins fast and evenly.',
    weight: { 'cranks-no-start': 2, stall: 1 },
    proof: [['belt-look:broken']],
    prove: 'Seen: belt torn or stripped, or the camshaft does not follow by hand.',
  },
} as const satisfies Record<string, Cause>;
