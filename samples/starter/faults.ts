/** One fault at a time; `none` is a sound engine. */
export const STARTER_FAULTS = [
  'none',
  'wide air gap',
  'chipped tooth',
  'bent wheel',
  'reversed wires',
  'belt slipped one tooth',
  'belt slipped two teeth',
  'shorted turns',
  'open secondary',
  'weak driver',
  'low supply',
  'no compression',
  'one weak cylinder',
  'injector without hump',
] as const;
export type StarterFault = (typeof STARTER_FAULTS)[number];

/** What a recording with the fault shows, for those who look at it afterwards. */
export const FAULT_WORDS: Readonly<Record<StarterFault, string>> = {
  none: 'sound',
  'wide air gap': 'the sensor sits too far from the wheel: every swing is low',
  'chipped tooth': 'one tooth passes with a third of its flux, every turn',
  'bent wheel': 'the swing varies by a third once a turn',
  'reversed wires': 'the two wires of the sensor, or the probe leads, are swapped',
  'belt slipped one tooth': 'the cam is late by one tooth of the crank’s sprocket',
  'belt slipped two teeth': 'the cam is late by two teeth of the crank’s sprocket',
  'shorted turns': 'the coil’s current jumps when it is switched on, and the kick is low',
  'open secondary': 'the kick stops flat at the driver’s clamp and rings out: no burn line',
  'weak driver': 'the driver does not pull low: the current stays small',
  'low supply': 'the battery breaks down while cranking: slow, and a deep dip',
  'no compression': 'cranks fast and evenly: no humps',
  'one weak cylinder': 'one hump of each cycle is low',
  'injector without hump': 'the needle does not move: no hump after the spike',
};
