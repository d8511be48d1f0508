import { grouped } from '../base/numbers.ts';
import { digitsFor, fixed, significant, withUnit } from '../plot/format.ts';
import type { PlotSignal } from '../plot/types.ts';
import type { CrankSpeed } from './crank-speed.ts';
import type { Taken } from './read-samples.ts';
import type { ShownSpectrum } from './spectrum-of.ts';

interface SpectrumPanelProps {
  shown: ShownSpectrum;
  taken: Taken;
  signal: PlotSignal;
  windowName: string;
  speed: CrankSpeed | null;
  chosen: number | null;
  onChoose: (place: number | null) => void;
}

/** Lines of the spectrum, what was looked for and not found, and how it was made. */
export function SpectrumPanel({
  shown,
  taken,
  signal,
  windowName,
  speed,
  chosen,
  onChoose,
}: SpectrumPanelProps) {
  const { lines, noise, lobeHz, found } = shown;
  const amplitude = (value: number) => withUnit(significant(value, 3), signal.unit);
  const hz = (value: number) => `${fixed(value, Math.max(digitsFor(lobeHz / 20), 1))} Hz`;
  const absent =
    speed === null ? [] : ABSENT.filter(([order]) => !lines.some(isAt(order * speed.hz, lobeHz)));
  return (
    <>
      <div className="numbers-head">
        <h2>Lines</h2>
        <span className="text-soft">{lines.length} above 4 × the noise</span>
      </div>
      <ol>
        {lines.map((line, place) => (
          <li key={line.frequencyHz}>
            <button
              type="button"
              className="number spectrum-row"
              aria-pressed={chosen === place}
              onClick={() => onChoose(chosen === place ? null : place)}
            >
              <span className="balloon">{place + 1}</span>
              <span className="number-label">{hz(line.frequencyHz)}</span>
              <span className="number-value">{amplitude(line.amplitude)}</span>
              {speed !== null && (
                <span className="number-detail">order {fixed(line.frequencyHz / speed.hz, 2)}</span>
              )}
            </button>
          </li>
        ))}
        {absent.map(([order, words]) => (
          <li key={order} className="number number-still">
            <span className="number-label">{words}</span>
            <span className="number-value">none</span>
            <span className="number-detail">below {amplitude(4 * noise)}</span>
          </li>
        ))}
      </ol>
      {lines.length === 0 && (
        <p className="spectrum-words text-soft">Nothing stands out: no frequency is four times the noise.</p>
      )}
      <h3 className="spectrum-words">How it was made</h3>
      <dl className="spectrum-facts">
        <Fact name="Window function" text={`${windowName}, amplitude corrected`} />
        <Fact
          name="Taken"
          text={`${fixed(taken.from, 4)} to ${fixed(taken.to, 4)} s, ${grouped(shown.samples)} samples${
            taken.shortened ? ', the middle of the window' : ''
          }`}
        />
        <Fact name="Step" text={`${significant(found.stepHz, 3)} Hz`} />
        <Fact name="Told apart" text={`from ${significant(lobeHz, 3)} Hz on`} />
        <Fact name="Up to" text={`${significant(shown.highestHz, 4)} Hz`} />
        <Fact name="Mean removed" text={amplitude(shown.mean)} />
        <Fact name="Noise, median" text={amplitude(noise)} />
        {shown.holes > 0 && <Fact name="Holes" text={`${grouped(shown.holes)}, taken as the mean`} />}
        {speed !== null && (
          <Fact
            name="Order 1"
            text={`${significant(speed.hz, 4)} Hz, ${fixed(speed.hz * 60, 1)} rpm from ${
              speed.from === 'teeth' ? 'the teeth in the window' : 'the numbers of the whole capture'
            }`}
          />
        )}
      </dl>
      {speed === null && (
        <p className="spectrum-words text-soft">
          No crank speed is known here, so there are no orders. A crank signal in the same capture gives them.
        </p>
      )}
    </>
  );
}

const ABSENT: readonly (readonly [order: number, words: string])[] = [
  [0.5, 'Order ½, once a cycle'],
  [1, 'Order 1, once a turn'],
];

const isAt = (hz: number, lobeHz: number) => (line: { frequencyHz: number }) =>
  Math.abs(line.frequencyHz - hz) < lobeHz / 2;

function Fact({ name, text }: { name: string; text: string }) {
  return (
    <div>
      <dt>{name}</dt>
      <dd className="figures">{text}</dd>
    </div>
  );
}
