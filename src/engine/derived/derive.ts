import { sampleCount } from '../signal/time.ts';
import { derivative, integral } from './change.ts';
import { lowPass } from './low-pass.ts';
import { movingMean } from './moving-mean.ts';
import { speedFromTeeth } from './tooth-speed.ts';
import type { Derived, DeriveInput, Recipe } from './types.ts';

/** Makes one derived signal; where that cannot be, every sample is a hole and `reason` says why. Never throws. */
export function derive(recipe: Recipe, input: DeriveInput): Derived {
  const { axis } = input;
  const source = input.source(recipe.of);
  const none = (name: string, unit: string, reason: string): Derived => ({
    name,
    unit,
    values: new Float32Array(sampleCount(axis)).fill(Number.NaN),
    made: name,
    reason,
  });
  if (source === undefined)
    return none('Derived signal', '', 'the signal it was made from is not there any more');
  const { name, unit, values } = source;
  const give = (title: string, of: string, made: string, result: Float32Array): Derived => ({
    name: title,
    unit: of,
    values: result,
    made,
    reason: null,
  });
  switch (recipe.kind) {
    case 'low-pass': {
      const title = `${name}, below ${recipe.cutoffHz} Hz`;
      if (axis.kind !== 'even') return none(title, unit, 'a low-pass needs samples at even steps');
      const made = `${name} through a second-order Butterworth low-pass of ${recipe.cutoffHz} Hz, forwards and backwards`;
      return give(title, unit, made, lowPass(values, 1 / axis.stepS, recipe.cutoffHz));
    }
    case 'moving-mean': {
      const title = `${name}, mean of ${recipe.lengthS * 1e3} ms`;
      if (axis.kind !== 'even') return none(title, unit, 'a moving mean needs samples at even steps');
      const length = Math.max(Math.round(recipe.lengthS / axis.stepS), 1);
      const odd = length % 2 === 0 ? length + 1 : length;
      return give(title, unit, `mean of ${odd} samples of ${name}, centred`, movingMean(values, odd));
    }
    case 'derivative':
      return give(`${name}, change`, perSecond(unit), `change of ${name} a second`, derivative(values, axis));
    case 'integral':
      return give(
        `${name}, area`,
        timesSecond(unit),
        `area under ${name} from its first sample`,
        integral(values, axis),
      );
    case 'absolute':
      return give(`${name}, without sign`, unit, `absolute value of ${name}`, values.map(Math.abs));
    case 'difference': {
      const other = input.source(recipe.less);
      const title = `${name} − ${other?.name ?? '?'}`;
      if (other === undefined) return none(title, unit, 'the second signal is not there any more');
      if (other.unit !== unit)
        return none(
          title,
          unit,
          `${unit || 'no unit'} and ${other.unit || 'no unit'} cannot be taken from each other`,
        );
      const result = values.map((value, i) => value - other.values[i]!);
      return give(title, unit, `${name} less ${other.name}, sample by sample`, result);
    }
    case 'speed': {
      const wheel = input.wheelOf(recipe.of);
      const title = `Speed from ${name}`;
      if (wheel === null) return none(title, 'rpm', 'no trigger wheel was found in it');
      return give(
        title,
        'rpm',
        `crank speed between the teeth of ${name} (${wheel.pattern})`,
        speedFromTeeth(axis, wheel),
      );
    }
  }
}

const perSecond = (unit: string) => (unit === '' || unit === '1' ? 's-1' : `${unit}/s`);
const timesSecond = (unit: string) => (unit === '' || unit === '1' ? 's' : `${unit}.s`);
