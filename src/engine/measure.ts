import type {
  CaptureFindings,
  CaptureInput,
  Findings,
  SignalFindings,
  SignalInput,
  Wheel,
} from './capture.ts';
import type { Circuit } from './circuit.ts';
import { type CamEdges, measureCam } from './circuits/cam.ts';
import { measureCoilCommand } from './circuits/coil-command.ts';
import { measureCoilPrimaryCurrent } from './circuits/coil-primary-current.ts';
import { measureCoilPrimaryVoltage } from './circuits/coil-primary-voltage.ts';
import { measureCrankHall } from './circuits/crank-hall.ts';
import { measureCrankPickup } from './circuits/crank-vr.ts';
import { measureFuelPumpCurrent } from './circuits/fuel-pump-current.ts';
import { measureInjectorCurrent } from './circuits/injector-current.ts';
import { measureInjectorVoltage } from './circuits/injector-voltage.ts';
import { measureOther } from './circuits/other.ts';
import { measureStarterCurrent } from './circuits/starter-current.ts';
import { measureSupplyVoltage } from './circuits/supply-voltage.ts';
import type { MeasuredSignal } from './circuits/types.ts';
import { relate } from './relations/index.ts';
import { ENGINE_VERSION } from './version.ts';

/**
 * Measures every signal of a capture and what they show together. Pure: the same input gives the same findings on
 * any machine. The samples are not changed.
 */
export function measureCapture(input: CaptureInput): CaptureFindings {
  const cams = new Map<number, CamEdges>();
  const findings = new Map<number, Findings>();
  let wheel: Wheel | null = null;

  // Cams first: they count the teeth of a crank wheel that has no gap.
  for (const signal of input.signals) {
    if (signal.circuit !== 'cam-hall' && signal.circuit !== 'cam-vr') continue;
    const { edges, ...found } = measureCam(measured(signal, input));
    findings.set(signal.index, found);
    if (edges) cams.set(signal.index, edges);
  }
  const [cam] = cams.values();
  for (const signal of input.signals) {
    const { index, circuit } = signal;
    if (circuit === 'cam-hall' || circuit === 'cam-vr') continue;
    if (circuit === 'crank-vr' || circuit === 'crank-hall') {
      const measureCrank = circuit === 'crank-vr' ? measureCrankPickup : measureCrankHall;
      const { wheel: found, ...rest } = measureCrank(measured(signal, input), {
        index,
        cylinders: input.cylinders,
        camEdgesS: cam?.risingS ?? cam?.fallingS ?? null,
      });
      findings.set(index, rest);
      wheel ??= found;
    } else {
      findings.set(index, measureByCircuit(measured(signal, input), circuit, input.cylinders));
    }
  }
  const signals: SignalFindings[] = input.signals.map(({ index, circuit }) => ({
    index,
    circuit,
    ...findings.get(index)!,
  }));
  return { engine: ENGINE_VERSION, signals, relations: relate(wheel, signals, cams), wheel };
}

type MeasuredAlone = Exclude<Circuit, 'crank-vr' | 'crank-hall' | 'cam-vr' | 'cam-hall'>;

function measureByCircuit(
  signal: MeasuredSignal,
  circuit: MeasuredAlone,
  cylinders: number | null,
): Findings {
  switch (circuit) {
    case 'coil-primary-voltage':
      return measureCoilPrimaryVoltage(signal);
    case 'coil-primary-current':
      return measureCoilPrimaryCurrent(signal);
    case 'coil-command':
      return measureCoilCommand(signal);
    case 'injector-voltage':
      return measureInjectorVoltage(signal);
    case 'injector-current':
      return measureInjectorCurrent(signal);
    case 'starter-current':
      return measureStarterCurrent(signal, cylinders);
    case 'supply-voltage':
      return measureSupplyVoltage(signal);
    case 'fuel-pump-current':
      return measureFuelPumpCurrent(signal);
    case 'other':
      return measureOther(signal);
  }
}

/** Factor and offset applied; the recorded array itself where they change nothing. */
function measured(signal: SignalInput, input: CaptureInput): MeasuredSignal {
  const { factor, offset, samples, rail } = signal;
  const plain = factor === 1 && offset === 0;
  const apply = (value: number) => value * factor + offset;
  const values = plain ? samples : samples.map(apply);
  const low = rail?.low ?? null;
  const high = rail?.high ?? null;
  const scaled = [low === null ? null : apply(low), high === null ? null : apply(high)] as const;
  return {
    circuit: signal.circuit,
    name: signal.name,
    unit: signal.unit,
    values,
    axis: input.axis,
    rail: rail
      ? factor < 0
        ? { low: scaled[1], high: scaled[0] }
        : { low: scaled[0], high: scaled[1] }
      : null,
  };
}
