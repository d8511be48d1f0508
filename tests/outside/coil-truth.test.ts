import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Circuit } from '../../src/engine/circuit.ts';
import { measureCoilPrimaryCurrent } from '../../src/engine/circuits/coil-primary-current.ts';
import { measureCoilPrimaryVoltage } from '../../src/engine/circuits/coil-primary-voltage.ts';
import { measureInjectorVoltage } from '../../src/engine/circuits/injector-voltage.ts';
import { proposeCircuit } from '../../src/engine/circuits/propose.ts';
import { measureStarterCurrent } from '../../src/engine/circuits/starter-current.ts';
import { capturesPresent, readCapture } from './fixtures/read-capture.ts';
import { codesOf, numberOf, valueFor } from './fixtures/values.ts';

/** Simulated captures beside the project with known truth (truth.json); skipped where that folder is missing. */
type Truth = ReadonlyArray<{
  file: string;
  sampleRateHz: number;
  signals: ReadonlyArray<Record<string, number>>;
}>;
const truthOf = (file: string) => {
  const all = JSON.parse(
    readFileSync(new URL('../../../shared/captures/truth.json', import.meta.url), 'utf8'),
  ) as Truth;
  const one = all.find((entry) => entry.file === file)!;
  const numbers: Record<string, number> = { ...one.signals[0], step_ms: 1000 / one.sampleRateHz };
  return (key: string): number => {
    const value = numbers[key];
    if (value === undefined) throw new Error(`truth.json has no ${key}`);
    return value;
  };
};

describe.skipIf(!capturesPresent)('simulated captures (skipped: captures not present)', () => {
  it('coil-primary-volts.csv', async () => {
    const truth = truthOf('coil-primary-volts.csv');
    const found = measureCoilPrimaryVoltage(
      await readCapture('coil-primary-volts.csv', 'coil-primary-voltage'),
    );
    expect(numberOf(found, 'firing_count')).toBe(truth('firing_count'));
    expect(Math.abs(numberOf(found, 'dwell') - truth('dwell_ms'))).toBeLessThan(
      truth('step_ms') + 0.002 * truth('dwell_ms'),
    );
    expect(Math.abs(numberOf(found, 'kick_peak') - truth('kick_peak_v'))).toBeLessThan(
      0.01 * truth('kick_peak_v'),
    );
    expect(Math.abs(numberOf(found, 'supply_level') - truth('supply_v'))).toBeLessThan(0.1);
    expect(Math.abs(numberOf(found, 'burn_time') - truth('burn_time_ms'))).toBeLessThan(
      truth('step_ms') + 0.002 * truth('burn_time_ms'),
    );
    expect(codesOf(found)).toEqual([]);
  });
  it('coil-primary-amperes.csv', async () => {
    const truth = truthOf('coil-primary-amperes.csv');
    const found = measureCoilPrimaryCurrent(
      await readCapture('coil-primary-amperes.csv', 'coil-primary-current'),
    );
    expect(numberOf(found, 'firing_count')).toBe(truth('firing_count'));
    expect(Math.abs(numberOf(found, 'dwell') - truth('dwell_ms'))).toBeLessThan(
      truth('step_ms') + 0.002 * truth('dwell_ms'),
    );
    expect(Math.abs(numberOf(found, 'peak_current') - truth('peak_current_a'))).toBeLessThan(
      0.01 * truth('peak_current_a'),
    );
    expect(Math.abs(numberOf(found, 'time_constant') - truth('tau_ms'))).toBeLessThan(0.02 * truth('tau_ms'));
    expect(valueFor(found, 'current_limited').value).toBe(false);
  });
  it('injector-saturated.csv', async () => {
    const truth = truthOf('injector-saturated.csv');
    const found = measureInjectorVoltage(await readCapture('injector-saturated.csv', 'injector-voltage'));
    expect(numberOf(found, 'pulse_count')).toBe(truth('pulse_count'));
    expect(Math.abs(numberOf(found, 'pulse_width') - truth('pulse_width_ms'))).toBeLessThan(
      truth('step_ms') + 0.002 * truth('pulse_width_ms'),
    );
    expect(Math.abs(numberOf(found, 'clamp_peak') - truth('clamp_v'))).toBeLessThan(0.01 * truth('clamp_v'));
    expect(Math.abs(numberOf(found, 'supply_level') - truth('supply_v'))).toBeLessThan(0.1);
  });
  it('starter-amperes-even.csv', async () => {
    const truth = truthOf('starter-amperes-even.csv');
    const found = measureStarterCurrent(
      await readCapture('starter-amperes-even.csv', 'starter-current'),
      truth('cylinders'),
    );
    expect(Math.abs(numberOf(found, 'inrush_peak') - truth('inrush_a'))).toBeLessThan(
      0.01 * truth('inrush_a'),
    );
    expect(Math.abs(numberOf(found, 'rpm_mean') / truth('rpm_mean_settled') - 1)).toBeLessThan(0.005);
    for (const one of valueFor(found, 'compression_balance').value as number[])
      expect(Math.abs(one)).toBeLessThan(3);
    expect(codesOf(found)).toEqual([]);
  });
  it.each<[string, string, number, Circuit]>([
    ['coil-primary-volts.csv', 'Coil 1', 1, 'coil-primary-voltage'],
    ['injector-saturated.csv', 'Injector 2', 1, 'injector-voltage'],
    ['crank-60-2-pickup.csv', 'Crank', 1, 'crank-vr'],
    ['crank-36-1-pickup-reversed.csv', 'KW', 1, 'crank-vr'],
    ['crank-36-2-three-wire.csv', 'Crank', 1, 'crank-hall'],
    ['crank-60-2-and-cam.csv', 'Cam', 2, 'cam-hall'],
  ])(
    '%s: "%s" in volts is proposed as what it is, and without its name not as something else for sure',
    async (file, name, column, circuit) => {
      const { values, axis } = await readCapture(file, circuit, column);
      const named = proposeCircuit({ name, unit: 'V', factor: 1, samples: values, axis });
      expect(named.circuit).toBe(circuit);
      expect(named.confidence).toBeGreaterThan(0.8);
      const unnamed = proposeCircuit({ name: '', unit: 'V', factor: 1, samples: values, axis });
      if (unnamed.circuit !== circuit) expect(unnamed.confidence).toBeLessThan(0.5);
    },
  );
});
