import { describe, expect, it } from 'vitest';
import { measureCoilPrimaryCurrent } from '../../src/engine/circuits/coil-primary-current.ts';
import { measureCoilPrimaryVoltage } from '../../src/engine/circuits/coil-primary-voltage.ts';
import { measureInjectorCurrent } from '../../src/engine/circuits/injector-current.ts';
import { measureInjectorVoltage } from '../../src/engine/circuits/injector-voltage.ts';
import { codesOf, numberOf, valueFor } from './fixtures/values.ts';
import { ngspicePresent, signalOf, simulate } from './ngspice/simulate.ts';

/** Circuits solved by ngspice (netlists in ngspice/). Bounds: the switch's own microsecond, and the accuracy contract. */
describe.skipIf(!ngspicePresent)('a coil simulated by ngspice (skipped: ngspice not present)', () => {
  it('gives the dwell, the L/R peak, the clamp and no burn line', { timeout: 90_000 }, () => {
    const columns = simulate('coil.cir');
    const volts = measureCoilPrimaryVoltage(signalOf(columns, 1, 'coil-primary-voltage', 'V'));
    expect(numberOf(volts, 'firing_count')).toBe(2);
    expect(numberOf(volts, 'firing_interval')).toBeCloseTo(20, 2);
    expect(Math.abs(numberOf(volts, 'dwell') - 4)).toBeLessThan(0.004 + 0.008 + 0.001);
    expect(Math.abs(numberOf(volts, 'supply_level') - 13.5)).toBeLessThan(0.13);
    // The clamp: 379.3 V plus the diode's drop of some 0.8 to 1.5 V at 6.7 A.
    expect(numberOf(volts, 'kick_peak')).toBeGreaterThan(379.3);
    expect(numberOf(volts, 'kick_peak')).toBeLessThan(382);
    expect(valueFor(volts, 'burn_time').value).toBeNull();
    expect(codesOf(volts)).toEqual(expect.arrayContaining(['kick-flat-top', 'no-burn-line']));

    const amperes = measureCoilPrimaryCurrent(signalOf(columns, 2, 'coil-primary-current', 'A', -1));
    // 13.5 V, 0.510 Ω, 7 mH (ST VB027BSP): i(4 ms) = 6.692 A, L/R = 13.73 ms.
    expect(numberOf(amperes, 'firing_count')).toBe(2);
    expect(Math.abs(numberOf(amperes, 'dwell') - 4)).toBeLessThan(0.02);
    expect(Math.abs(numberOf(amperes, 'peak_current') - 6.692)).toBeLessThan(0.067);
    expect(Math.abs(numberOf(amperes, 'time_constant') - 13.725)).toBeLessThan(0.5);
  });
});

describe.skipIf(!ngspicePresent)('an injector simulated by ngspice (skipped: ngspice not present)', () => {
  it('gives pulse width, clamp, levels and current', { timeout: 90_000 }, () => {
    const columns = simulate('injector.cir');
    const volts = measureInjectorVoltage(signalOf(columns, 1, 'injector-voltage', 'V'));
    expect(numberOf(volts, 'pulse_count')).toBe(2);
    expect(Math.abs(numberOf(volts, 'pulse_width') - 8)).toBeLessThan(0.01 + 0.016 + 0.001);
    expect(numberOf(volts, 'clamp_peak')).toBeGreaterThan(64.3);
    expect(numberOf(volts, 'clamp_peak')).toBeLessThan(66);
    expect(Math.abs(numberOf(volts, 'supply_level') - 13.8)).toBeLessThan(0.14);
    const amperes = measureInjectorCurrent(signalOf(columns, 2, 'injector-current', 'A', -1));
    expect(numberOf(amperes, 'pulse_count')).toBe(2);
    // 13.8 V over 14.3 Ω; τ = 16 mH / 14.3 Ω = 1.12 ms, so 8 ms reach 99.9 % of it.
    expect(Math.abs(numberOf(amperes, 'peak_current') - 13.8 / 14.3)).toBeLessThan(0.01);
    expect(valueFor(amperes, 'hump_time').value).toBeNull();
  });
});
