import type { Cause } from '../../types.ts';

/** What keeps the engine from turning as it should, and what feeds the control unit. */
export const startCauses = {
  'battery-weak': {
    name: 'Battery flat or worn out',
    part: 'battery',
    because:
      'Under the starter its voltage falls too far to turn the engine or to keep the control unit awake.',
    weight: { 'cranks-no-start': 2, 'slow-crank': 5 },
    proof: [['battery-test:fails']],
    prove: 'A load or conductance test fails with the battery charged.',
  },
  'battery-cable': {
    name: 'Bad battery terminal, cable or engine ground',
    part: 'cable or ground strap',
    because: 'A poor joint drops volts only while the starter draws current.',
    weight: { 'cranks-no-start': 2, 'slow-crank': 4, stall: 1 },
    proof: [['cable-drop:too-high']],
    prove: 'A voltage drop above half a volt over the cable or the ground side while cranking.',
  },
  starter: {
    name: 'Starter worn or shorted',
    part: 'starter',
    because:
      'It draws much current and turns slowly although supply and engine are sound, or it does not turn at all with supply at hand.',
    weight: { 'slow-crank': 4 },
    proof: [
      ['starter-current:high', 'turn-by-hand:free'],
      ['starter-feed:there', 'turn-by-hand:free'],
    ],
    prove:
      'High current at low speed on an engine that turns freely by hand; or supply and command at the starter and no turning.',
  },
  'starter-command': {
    name: 'Starter not commanded: relay, switch or interlock',
    part: 'starter circuit',
    because: 'The starter gets no command, so nothing turns.',
    weight: { 'slow-crank': 3 },
    proof: [['starter-feed:no-command']],
    prove: 'Battery voltage at the main terminal and none at the command terminal with the key at start.',
  },
  'engine-drag': {
    name: 'Engine or driven unit drags or is seized',
    part: 'engine or belt-driven unit',
    because: 'A tight bearing, a seized pump or generator holds the engine back.',
    weight: { 'slow-crank': 2 },
    proof: [['turn-by-hand:tight']],
    prove: 'It turns hard or not at all by hand with the plugs out and the cylinders dry.',
  },
  'liquid-in-cylinder': {
    name: 'Liquid in a cylinder',
    part: 'cylinder',
    because: 'Water, fuel or oil cannot be compressed: the piston stops on it.',
    weight: { 'slow-crank': 2, 'cranks-no-start': 1 },
    proof: [['turn-by-hand:liquid']],
    prove: 'With the plugs out, liquid comes from a plug hole when the engine is turned by hand.',
  },
  'control-fuse': {
    name: 'Blown fuse for ignition, injection or control unit',
    part: 'fuse',
    because: 'One fuse often feeds coils, injectors and the control unit together.',
    weight: { 'cranks-no-start': 4, stall: 1 },
    proof: [['fuses:blown']],
    prove: 'The fuse is open. Find out why before a new one goes in.',
  },
  'main-relay': {
    name: 'Main relay does not close or drops out',
    part: 'main relay',
    because: 'Without it coils, injectors and most of the control unit are dead.',
    weight: { 'cranks-no-start': 3, stall: 3 },
    proof: [['main-relay:no-output']],
    prove: 'Its coil is switched and its input has supply, but no voltage leaves it.',
  },
  'control-supply': {
    name: 'Supply or ground wiring of the control unit',
    part: 'wiring',
    because: 'A control unit without supply or ground commands nothing.',
    weight: { 'cranks-no-start': 2, stall: 2 },
    proof: [['control-supply:missing', 'main-relay:output', 'fuses:good']],
    prove: 'Fuse and relay pass voltage, and supply or ground is missing under load at the control unit.',
  },
  'ignition-switch': {
    name: 'Ignition switch loses its feed in the start position',
    part: 'ignition switch',
    because:
      'Worn contacts feed the circuits with the key on and drop them while cranking, or now and then on the road.',
    weight: { 'cranks-no-start': 2, stall: 2 },
    proof: [['coil-feed-cranking:lost', 'ignition-switch:bad']],
    prove: 'The feed is lost while cranking, and the voltage is lost at the output of the switch too.',
  },
  'control-unit': {
    name: 'Control unit itself',
    part: 'control unit',
    because: 'Everything that it needs arrives and what it should command does not come.',
    weight: { 'cranks-no-start': 1, stall: 1, misfire: 1 },
    proof: [['control-unit:bad']],
    prove:
      'All supplies, grounds and input signals proved good at its own plug, wiring proved, output missing.',
  },
  immobiliser: {
    name: 'Immobiliser does not release',
    part: 'immobiliser, key or aerial',
    because: 'It blocks injection, ignition or the starter although the parts are sound.',
    weight: { 'cranks-no-start': 3, stall: 1 },
    proof: [
      ['immobiliser-data:refused'],
      ['immobiliser-lamp:blocked', 'injector-pulse:none', 'crank-trace:regular'],
    ],
    prove:
      'The control unit reports that the key was not accepted; or its lamp says so and injection is withheld with a whole crank signal. A second key known to the vehicle starts it.',
  },
  'reference-short': {
    name: 'Sensor supply pulled down by a shorted sensor or wire',
    part: 'sensor or wiring on the sensor supply',
    because: 'One short takes the supply of every sensor on that line.',
    weight: { 'cranks-no-start': 1, stall: 1 },
    proof: [['reference-unplug:returns']],
    prove: 'The supply returns when one sensor or branch is unplugged.',
  },
} as const satisfies Record<string, Cause>;
