import { useState } from 'react';
import type { WheelJson } from '../../contract/areas/captures.ts';
import type { IrregularTooth } from '../../engine/value.ts';
import { fixed } from '../plot/format.ts';
import {
  onCircle,
  stretchOfTooth,
  toothPath,
  turnToGap,
  type WheelTooth,
  wheelTeeth,
} from './wheel-geometry.ts';

const RING = 150;
const MEAN_HEIGHT = 30;

interface WheelProps {
  captureId: string;
  wheel: NonNullable<WheelJson>;
  irregular: readonly IrregularTooth[];
  speed: string | null;
}

/** The trigger wheel redrawn from the trace: each tooth at its mean angle, its swing as its length, the gap at the top. */
export function Wheel({ captureId, wheel, irregular, speed }: WheelProps) {
  const teeth = wheelTeeth(wheel);
  const [chosen, setChosen] = useState(irregular[0]?.tooth ?? 1);
  const turn = turnToGap(teeth);
  const half = Math.min((360 / Math.max(wheel.places ?? teeth.length, 1)) * 0.26, 8);
  const odd = new Set(irregular.map(({ tooth }) => tooth));
  const tooth = teeth[chosen - 1];
  const step = (by: number) => setChosen(((chosen - 1 + by + teeth.length) % teeth.length) + 1);
  const outer = (height: number | null) => RING + MEAN_HEIGHT * Math.min(Math.max(height ?? 1, 0.06), 1.7);
  const every = teeth.length > 40 ? 10 : teeth.length > 14 ? 5 : 1;
  return (
    <div className="wheel-page">
      <figure className="wheel-figure">
        <svg
          viewBox="-240 -240 480 480"
          role="img"
          aria-label={`Wheel ${wheel.pattern} with ${teeth.length} teeth`}
        >
          <circle className="wheel-ring" r={RING} />
          {wheel.toothHeights !== null && <circle className="wheel-mean" r={RING + MEAN_HEIGHT} />}
          {teeth.map(({ tooth: number, angleDeg, height }) => (
            <path
              key={number}
              className={
                number === chosen
                  ? 'wheel-tooth wheel-chosen'
                  : odd.has(number)
                    ? 'wheel-tooth wheel-odd'
                    : 'wheel-tooth'
              }
              d={toothPath(angleDeg + turn, half, RING, outer(height))}
            />
          ))}
          {teeth
            .filter(({ tooth: number }) => number === 1 || number % every === 0 || odd.has(number))
            .map(({ tooth: number, angleDeg }) => {
              const [x, y] = onCircle(angleDeg + turn, RING + 66);
              return (
                <text
                  key={number}
                  className={
                    odd.has(number) || number === 1 ? 'wheel-number wheel-number-strong' : 'wheel-number'
                  }
                  x={x}
                  y={y + 4}
                  textAnchor="middle"
                >
                  {number}
                </text>
              );
            })}
          <text className="wheel-pattern" y={-2} textAnchor="middle">
            {wheel.pattern.replaceAll('-', '−')}
          </text>
          {speed !== null && (
            <text className="wheel-speed" y={22} textAnchor="middle">
              {speed}
            </text>
          )}
          <text className="wheel-note" y={-RING + 26} textAnchor="middle">
            {wheel.places === null ? '' : 'gap'}
          </text>
        </svg>
        <figcaption className="text-soft">
          {wheel.toothHeights === null
            ? 'A three-wire sensor gives two levels, so teeth have a place but no height here.'
            : 'A tooth’s length is its swing against the mean of all (dashed). Mean of the complete turns.'}
        </figcaption>
      </figure>
      <div className="wheel-side">
        <div className="wheel-stepper">
          <button type="button" className="button" onClick={() => step(-1)}>
            Previous
          </button>
          <p aria-live="polite">
            <b>Tooth {chosen}</b>
            {tooth !== undefined && <span className="figures">{toothWords(tooth)}</span>}
          </p>
          <button type="button" className="button" onClick={() => step(1)}>
            Next
          </button>
        </div>
        <ToothLink captureId={captureId} wheel={wheel} tooth={chosen} />
        <Bars teeth={teeth} of="height" chosen={chosen} onChoose={setChosen} />
        <Bars teeth={teeth} of="lateDeg" chosen={chosen} onChoose={setChosen} />
        <h2>Irregular teeth</h2>
        {irregular.length === 0 ? (
          <p className="text-soft">None: no tooth differs from its neighbours in most of the turns.</p>
        ) : (
          <ul className="wheel-list">
            {irregular.map(({ tooth: number, height_ratio, spacing_ratio }) => (
              <li key={number}>
                <button type="button" className="button button-quiet" onClick={() => setChosen(number)}>
                  Tooth {number}
                </button>
                <span className="figures">
                  {[
                    height_ratio === null ? '' : `${fixed(height_ratio, 2)} × its neighbours’ height`,
                    spacing_ratio === null ? '' : `${fixed(spacing_ratio, 2)} × their spacing`,
                  ]
                    .filter((part) => part !== '')
                    .join(', ')}
                </span>
              </li>
            ))}
          </ul>
        )}
      </div>
    </div>
  );
}

const toothWords = ({ angleDeg, height, lateDeg }: WheelTooth) =>
  [
    ` ${fixed(angleDeg, 1)}°`,
    height === null ? '' : `, swing ${fixed(height, 2)} × mean`,
    lateDeg === null ? '' : `, ${fixed(Math.abs(lateDeg), 2)}° ${lateDeg < 0 ? 'early' : 'late'}`,
  ].join('');

function ToothLink({
  captureId,
  wheel,
  tooth,
}: {
  captureId: string;
  wheel: NonNullable<WheelJson>;
  tooth: number;
}) {
  const stretch = stretchOfTooth(wheel, tooth);
  if (stretch === null) return null;
  const address = `/captures/${captureId}?from=${stretch.from.toPrecision(9)}&to=${stretch.to.toPrecision(9)}`;
  return (
    <a className="link" href={address}>
      Show its samples in the trace
    </a>
  );
}

interface BarsProps {
  teeth: readonly WheelTooth[];
  of: 'height' | 'lateDeg';
  chosen: number;
  onChoose: (tooth: number) => void;
}

/** Swing or lateness tooth by tooth. */
function Bars({ teeth, of, chosen, onChoose }: BarsProps) {
  const values = teeth.map((tooth) => tooth[of]);
  if (values.some((value) => value === null)) return null;
  const base = of === 'height' ? 1 : 0;
  const reach = Math.max(
    ...values.map((value) => Math.abs((value ?? base) - base)),
    of === 'height' ? 0.2 : 0.2,
  );
  const width = 480 / teeth.length;
  return (
    <figure className="wheel-bars">
      <figcaption>
        {of === 'height' ? 'Swing against the mean, by tooth' : 'Late (up) or early (down), by tooth'}{' '}
        <span className="text-soft">
          full height {of === 'height' ? `± ${fixed(reach, 2)} ×` : `± ${fixed(reach, 2)}°`}
        </span>
      </figcaption>
      <svg
        viewBox="0 0 480 60"
        preserveAspectRatio="none"
        aria-hidden="true"
        onClick={(event) => {
          const box = event.currentTarget.getBoundingClientRect();
          onChoose(
            Math.min(Math.floor(((event.clientX - box.left) / box.width) * teeth.length), teeth.length - 1) +
              1,
          );
        }}
      >
        <path className="bars-zero" d="M0 30H480" />
        {teeth.map((tooth, place) => {
          const size = (((tooth[of] ?? base) - base) / reach) * 28;
          return (
            <rect
              key={tooth.tooth}
              className={tooth.tooth === chosen ? 'bar-one bar-one-chosen' : 'bar-one'}
              x={place * width + width * 0.2}
              y={size > 0 ? 30 - size : 30}
              width={width * 0.6}
              height={Math.max(Math.abs(size), 0.5)}
            />
          );
        })}
      </svg>
    </figure>
  );
}
