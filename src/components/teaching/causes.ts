/** Common causes to choose from when building an exercise. Keys stay, so that answers can be counted across exercises. */
export const COMMON_CAUSES: readonly {
  readonly key: string;
  readonly text: string;
  readonly hint: string;
}[] = [
  { key: 'nothing-wrong', text: 'Nothing wrong here', hint: 'look elsewhere' },
  { key: 'bent-or-chipped-tooth', text: 'Bent or chipped tooth', hint: 'or dirt in one tooth space' },
  { key: 'wide-air-gap', text: 'Wide air gap at the sensor', hint: 'or a weak sensor' },
  { key: 'leads-turned-over', text: 'Leads turned over', hint: 'polarity inverted' },
  { key: 'wiring-opens', text: 'Wiring that opens now and then', hint: 'chafed, loose pin' },
  { key: 'bent-wheel', text: 'Bent wheel', hint: 'or run-out' },
  { key: 'cam-out-of-step', text: 'Cam out of step with the crank', hint: 'belt or chain moved' },
  { key: 'open-secondary', text: 'Open secondary circuit', hint: 'the plug’s gap does not break down' },
  { key: 'shorted-turns', text: 'Shorted turns in the coil', hint: 'current rises too fast' },
  { key: 'high-resistance', text: 'High resistance in the feed', hint: 'current stays low' },
  { key: 'weak-driver', text: 'Weak driver', hint: 'does not pull down fully' },
  { key: 'low-supply', text: 'Low supply while cranking', hint: 'battery or cables' },
  { key: 'one-weak-cylinder', text: 'One weak cylinder', hint: 'low compression in one' },
  { key: 'no-compression', text: 'No compression in any cylinder', hint: 'belt or chain broken' },
  { key: 'needle-stuck', text: 'Injector needle does not move', hint: 'no hump after the spike' },
];
