import { coilCommandTrial } from './circuits/coil-command.ts';
import { coilCurrentTrial } from './circuits/coil-current.ts';
import { coilVoltageTrial } from './circuits/coil-voltage.ts';
import { fuelPumpTrial } from './circuits/fuel-pump.ts';
import { injectorCurrentTrial } from './circuits/injector-current.ts';
import { injectorVoltageTrial } from './circuits/injector-voltage.ts';
import { otherTrial } from './circuits/other.ts';
import { starterTrial } from './circuits/starter.ts';
import { supplyTrial } from './circuits/supply.ts';
import type { TrialOf } from './trial.ts';

export const TRIALS: Readonly<Record<string, TrialOf>> = {
  'coil-primary-voltage': coilVoltageTrial,
  'coil-primary-current': coilCurrentTrial,
  'coil-command': coilCommandTrial,
  'injector-voltage': injectorVoltageTrial,
  'injector-current': injectorCurrentTrial,
  'starter-current': starterTrial,
  'supply-voltage': supplyTrial,
  'fuel-pump-current': fuelPumpTrial,
  other: otherTrial,
};
