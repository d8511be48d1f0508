import { describe, expect, it } from 'vitest';
import type { Circuit } from '../circuit.ts';
import { wordsOf } from './propose/name-role.ts';
import { proposeCircuit } from './propose.ts';

const axis = { kind: 'even', startS: 0, stepS: 1e-4, count: 20_000 } as const;
const trace = (of: (t: number) => number) =>
  Float32Array.from({ length: axis.count }, (_, i) => of(i * 1e-4));
const swing = trace((t) => 2 * Math.sin(2 * Math.PI * 200 * t));
const square = trace((t) => ((t * 200) % 1 < 0.5 ? 0.1 : 4.9));
const kicks = trace((t) => ((t * 10) % 1 < 0.04 ? 0.9 : (t * 10) % 1 < 0.043 ? 280 : 12.1));
const ramps = trace((t) => ((t * 10) % 1 < 0.04 ? ((t * 10) % 1) * 200 : 0));
const starter = trace((t) => 160 + 40 * Math.sin(2 * Math.PI * 6 * t));
const steady = trace(() => 12.4);
const propose = (name: string, unit: string | null, samples: Float32Array) =>
  proposeCircuit({ name, unit, factor: 1, samples, axis });

describe('proposeCircuit()', () => {
  it.each<[string, string | null, Float32Array, Circuit]>([
    ['Crank', 'V', swing, 'crank-vr'],
    ['Crankshaft sensor', 'V', square, 'crank-hall'],
    ['KW-Geber', 'V', swing, 'crank-vr'],
    ['CKP', null, square, 'crank-hall'],
    ['Nockenwelle', 'V', square, 'cam-hall'],
    ['NW', 'V', square, 'cam-hall'],
    ['CMP 1', 'V', swing, 'cam-vr'],
    ['Arbre à cames', 'V', square, 'cam-hall'],
    ['Capteur PMH', 'V', swing, 'crank-vr'],
    ['Zündspule 1', 'V', kicks, 'coil-primary-voltage'],
    ['Coil1', 'A', ramps, 'coil-primary-current'],
    ['Bobine', 'V', kicks, 'coil-primary-voltage'],
    ['IGT2', 'V', square, 'coil-command'],
    ['Coil trigger', 'V', square, 'coil-command'],
    ['Einspritzventil Zyl. 2', 'V', kicks, 'injector-voltage'],
    ['Injector 3', 'A', ramps, 'injector-current'],
    ['Anlasser', 'A', starter, 'starter-current'],
    ['Cranking current', 'A', starter, 'starter-current'],
    ['Démarreur', 'A', starter, 'starter-current'],
    ['Battery', 'V', steady, 'supply-voltage'],
    ['Ignition feed', 'V', steady, 'supply-voltage'],
    ['Starter battery', 'V', steady, 'supply-voltage'],
    ['Kl. 30', 'V', steady, 'supply-voltage'],
    ['Fuel pump', 'A', starter, 'fuel-pump-current'],
    ['Kraftstoffpumpe', 'A', ramps, 'fuel-pump-current'],
    ['Rail pressure', 'kPa', steady, 'other'],
  ])('reads "%s" in %s as the name and shape say', (name, unit, samples, circuit) => {
    const proposal = propose(name, unit, samples);
    expect(proposal.circuit).toBe(circuit);
    expect(proposal.confidence).toBeGreaterThan(0.5);
  });
  it.each<[string, Float32Array, Circuit]>([
    ['V', swing, 'crank-vr'],
    ['V', square, 'crank-hall'],
    ['V', kicks, 'coil-primary-voltage'],
    ['A', starter, 'starter-current'],
    ['A', ramps, 'coil-primary-current'],
    ['V', steady, 'supply-voltage'],
  ])('takes the shape in %s where the name says nothing, and is never sure', (unit, samples, circuit) => {
    const proposal = propose('Channel 1', unit, samples);
    expect(proposal.circuit).toBe(circuit);
    expect(proposal.confidence).toBeLessThanOrEqual(0.7);
  });
  it('is unsure when name and unit contradict each other, and when a name says two things', () => {
    expect(propose('Starter', 'V', steady).confidence).toBeLessThan(0.5);
    expect(propose('Crank', 'A', starter).confidence).toBeLessThanOrEqual(0.7);
    expect(propose('cam and coil', 'V', steady).confidence).toBeLessThan(0.5);
  });
  it('is unsure without samples, and without a name about a flat line', () => {
    expect(
      proposeCircuit({ name: '', unit: 'V', factor: 1, samples: new Float32Array(), axis }).confidence,
    ).toBeLessThan(0.3);
    expect(
      propose(
        '',
        'V',
        trace(() => 0),
      ).confidence,
    ).toBeLessThan(0.3);
    expect(
      propose(
        '',
        'V',
        trace(() => Number.NaN),
      ).confidence,
    ).toBeLessThan(0.3);
  });
  it('applies the prefix of the unit before it looks at the shape', () => {
    const milli = starter.map((v) => v * 1000);
    expect(proposeCircuit({ name: 'ch2', unit: 'A', factor: 0.001, samples: milli, axis }).circuit).toBe(
      'starter-current',
    );
  });
});

describe('wordsOf()', () => {
  it('splits at punctuation and capitals, drops accents, and offers a word without its number', () => {
    expect(wordsOf('KW-Geber')).toEqual(['kw', 'geber']);
    expect(wordsOf('CamSensor_2')).toEqual(['cam', 'sensor', '2']);
    expect(wordsOf('Zündspule1')).toEqual(['zundspule1', 'zundspule']);
    expect(wordsOf('  ')).toEqual([]);
  });
});
