import { useState } from 'react';
import type { NearestJson } from '../../contract/areas/library.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { circuitWords } from '../base/circuits.ts';
import { Message } from '../base/Message.tsx';
import { type PortraitLike, portraitPath, scaleOfBoth } from '../portrait/portrait-path.ts';

interface NearestProps {
  id: string;
  signal: { readonly index: number; readonly name: string; readonly circuit: string };
  busy: string | null;
  onCompare: (key: string, target: Record<string, unknown>) => void;
}

const BOX = { width: 240, height: 64 };

/** "Nearest to this signal": published known-goods whose shape lies nearest, each with its distance, why, and the two as a small picture. */
export function Nearest({ id, signal, busy, onCompare }: NearestProps) {
  const [found, setFound] = useState<NearestJson | null>(null);
  const [looking, setLooking] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const look = async () => {
    setLooking(true);
    setTrouble(null);
    try {
      const { data } = await api<NearestJson>(`/captures/${id}/nearest`, {
        method: 'POST',
        body: { signal: signal.index, limit: 6 },
      });
      setFound(data);
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    } finally {
      setLooking(false);
    }
  };
  return (
    <section aria-labelledby="nearest-title">
      <h2 id="nearest-title">Nearest to {signal.name} by shape</h2>
      {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
      {found === null && (
        <div className="picker-none">
          <p>
            Looks through every published known-good of this circuit, whatever engine it is of. Speed and
            sampling do not matter.
          </p>
          <Button busy={looking} onClick={look}>
            Find the nearest
          </Button>
        </div>
      )}
      {found?.reason != null && <p className="picker-none">{found.reason}</p>}
      {found !== null && found.reason === null && found.items.length === 0 && (
        <p className="picker-none">The library holds no published known-good of this circuit with a shape.</p>
      )}
      {found !== null && found.items.length > 0 && (
        <ul className="nearest-list" aria-label={`Nearest of ${found.searched}`}>
          {found.items.map((item) => (
            <li key={`${item.knownGoodId} ${item.signal}`}>
              {item.portrait !== null && found.portrait !== null && (
                <Pair here={found.portrait} reference={item.portrait} circuit={signal.circuit} />
              )}
              <b>
                {[item.engine.make, item.engine.model, item.engine.code]
                  .filter((part) => part !== '')
                  .join(' ')}
              </b>
              <p>
                <span className="figures">{item.distance.toFixed(2)}</span> apart, {item.condition}
              </p>
              <p className="text-soft">{item.why}</p>
              <Button
                busy={busy === `near ${item.knownGoodId}`}
                onClick={() =>
                  onCompare(`near ${item.knownGoodId}`, {
                    knownGoodId: item.knownGoodId,
                    otherSignal: item.signal,
                  })
                }
              >
                Compare
              </Button>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

/** Here in full, the reference thinner and dashed, on one scale. */
function Pair({
  here,
  reference,
  circuit,
}: {
  here: PortraitLike;
  reference: PortraitLike;
  circuit: string;
}) {
  const scale = scaleOfBoth(here, reference);
  return (
    <svg
      className={`role-${circuitWords(circuit).role}`}
      viewBox={`0 0 ${BOX.width} ${BOX.height}`}
      preserveAspectRatio="none"
      fill="none"
      stroke="currentColor"
      aria-hidden="true"
    >
      <path
        d={portraitPath(reference, BOX, scale)}
        strokeDasharray="4 2"
        opacity="0.8"
        vectorEffect="non-scaling-stroke"
      />
      <path d={portraitPath(here, BOX, scale)} strokeWidth="1.5" vectorEffect="non-scaling-stroke" />
    </svg>
  );
}
