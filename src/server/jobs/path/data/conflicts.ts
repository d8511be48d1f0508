import type { Conflict } from '../types.ts';

/** Pairs of findings that cannot both be true of one engine at one time. Common practice, no source. */
export const CONFLICTS: readonly Conflict[] = [
  { one: 'spark:good', other: 'crank-trace:none', why: 'Without a crank signal there is usually no spark.' },
  {
    one: 'spark:good',
    other: 'coil-feed:missing',
    why: 'A coil without feed makes no spark, unless it is fed only while cranking.',
  },
  { one: 'spark:good', other: 'coil-command:none', why: 'A coil that is not switched makes no spark.' },
  { one: 'spark:good', other: 'coil-primary:no-kick', why: 'Without a kick there is no spark.' },
  {
    one: 'spark:good',
    other: 'coil-primary:no-burn',
    why: 'Without a burn line the gap did not break down.',
  },
  { one: 'spark:none', other: 'coil-primary:good', why: 'A burn line is a spark at that coil.' },
  { one: 'spark:none', other: 'starting-fluid:runs', why: 'It cannot run for a moment without a spark.' },
  {
    one: 'coil-command:pulses',
    other: 'crank-trace:none',
    why: 'Without a crank signal there is usually no command.',
  },
  {
    one: 'injector-pulse:pulses',
    other: 'crank-trace:none',
    why: 'Without a crank signal there is usually no injection.',
  },
  {
    one: 'injector-pulse:pulses',
    other: 'throttle-data:wide-open',
    why: 'In clear-flood the injectors stay shut.',
  },
  {
    one: 'crank-trace:regular',
    other: 'crank-at-sensor:none',
    why: 'What does not leave the sensor cannot arrive.',
  },
  {
    one: 'crank-trace:regular',
    other: 'crank-winding:off',
    why: 'An open or shorted winding makes no regular signal.',
  },
  { one: 'compression:good', other: 'belt-look:broken', why: 'Standing cams give no compression.' },
  { one: 'compression:good', other: 'cranking:fast-even', why: 'Full compression slows the starter.' },
  {
    one: 'compression:none',
    other: 'belt-look:good',
    why: 'With the valves in time there is some compression.',
  },
  { one: 'rhythm:even', other: 'compression:one-low', why: 'A low cylinder shows in the rhythm.' },
  { one: 'cranking:usual', other: 'compression:none', why: 'Without compression it spins fast.' },
  {
    one: 'cam-phase:inside',
    other: 'belt-look:slipped',
    why: 'A slipped belt shifts the cam against the crank.',
  },
  { one: 'cam-phase:inside', other: 'belt-look:broken', why: 'With a broken belt the cam stands.' },
  { one: 'cam-trace:regular', other: 'belt-look:broken', why: 'With a broken belt the cam stands.' },
  { one: 'rail-pressure:good', other: 'fuel-level:empty', why: 'An empty tank makes no pressure.' },
  { one: 'rail-pressure:good', other: 'pump-current:none', why: 'A pump without current makes no pressure.' },
  {
    one: 'pump-prime:runs',
    other: 'pump-supply:none',
    why: 'A pump that is heard is fed, unless it is fed only for the first seconds.',
  },
  { one: 'pump-prime:runs', other: 'pump-current:none', why: 'A pump that is heard draws current.' },
  {
    one: 'engine-lamp:dark',
    other: 'codes:none',
    why: 'A control unit that answers is awake, unless the lamp itself is out.',
  },
  {
    one: 'codes:no-answer',
    other: 'injector-pulse:pulses',
    why: 'A control unit that injects is awake; look at the diagnostic plug.',
  },
  {
    one: 'supply-cranking:holds',
    other: 'battery-test:fails',
    why: 'A battery that fails the test rarely holds under the starter.',
  },
  {
    one: 'immobiliser-data:refused',
    other: 'injector-pulse:pulses',
    why: 'A control unit that injects has accepted the key.',
  },
  { one: 'turn-by-hand:liquid', other: 'cranking:usual', why: 'Liquid in a cylinder stops the engine.' },
  {
    one: 'fuses:blown',
    other: 'control-supply:good',
    why: 'An open control fuse takes the supply, unless it feeds another circuit.',
  },
];
