import './compare.css';
import { useState } from 'react';
import useSWR from 'swr';
import type { CaptureJson, CaptureRowJson } from '../../contract/areas/captures.ts';
import type { KnownGoodRowJson } from '../../contract/areas/library.ts';
import { api, fetcher, fetcherWithEtag, sentenceOf } from '../base/api.ts';
import { circuitWords } from '../base/circuits.ts';
import { Message } from '../base/Message.tsx';
import { timeText } from '../base/numbers.ts';
import { Progress } from '../base/Progress.tsx';
import { Segmented } from '../base/Segmented.tsx';
import { Nearest } from './Nearest.tsx';
import { Saved } from './Saved.tsx';

interface Page<T> {
  readonly items: readonly T[];
  readonly nextCursor: string | null;
}

/** From three known-goods of one engine and condition on there is a band. */
const BAND_FROM = 3;

/** Chooses what a signal is compared with: a band, a published known-good of the same circuit, or another capture. */
export function ComparePicker({ id }: { id: string }) {
  const loaded = useSWR(`/captures/${id}`, fetcherWithEtag<CaptureJson>, { shouldRetryOnError: false });
  const capture = loaded.data?.data;
  const [signalIndex, setSignalIndex] = useState<number | null>(null);
  const [search, setSearch] = useState('');
  const [busy, setBusy] = useState<string | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const signal = capture?.signals.find((each) => each.index === signalIndex) ?? capture?.signals[0];
  const circuit = signal?.circuit;
  const words = search.trim() === '' ? '' : `&search=${encodeURIComponent(search.trim())}`;
  const keep = { shouldRetryOnError: false, keepPreviousData: true };
  const goods = useSWR(
    circuit === undefined
      ? null
      : `/known-goods?state=published&limit=100&fit=${id}&circuit=${circuit}${words}`,
    fetcher<Page<KnownGoodRowJson>>,
    keep,
  );
  const captures = useSWR(
    circuit === undefined ? null : `/captures?status=ready&limit=50&circuit=${circuit}${words}`,
    fetcher<Page<CaptureRowJson>>,
    keep,
  );

  const compare = async (key: string, target: Record<string, unknown>) => {
    if (signal === undefined || busy !== null) return;
    setBusy(key);
    setTrouble(null);
    try {
      const { data } = await api<{ id: string }>(`/captures/${id}/comparisons`, {
        method: 'POST',
        body: { signal: signal.index, ...target },
      });
      location.assign(`/comparisons/${data.id}`);
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      setBusy(null);
    }
  };

  if (capture === undefined)
    return (
      <div className="comparison-state">
        {loaded.error === undefined ? (
          <Progress label="Loading the capture" />
        ) : (
          <Message
            verdict="bad"
            live="alert"
            title="The capture could not be loaded"
            happened={sentenceOf(loaded.error)}
          />
        )}
      </div>
    );
  const others = captures.data?.items.filter((row) => row.id !== id) ?? [];
  const published = goods.data?.items ?? [];
  const row = (key: string, title: string, detail: string, target: Record<string, unknown>) => (
    <li key={key}>
      <button
        type="button"
        className="reference-row"
        aria-busy={busy === key || undefined}
        onClick={() => compare(key, target)}
      >
        <b>{title}</b>
        <span className="text-soft">{detail}</span>
        <span className="reference-go">{busy === key ? 'Comparing …' : 'Compare'}</span>
      </button>
    </li>
  );
  return (
    <div className="picker">
      <header className="title-row">
        <h1>Compare {capture.title}</h1>
        <div className="title-actions">
          <a className="button" href={`/captures/${id}`}>
            Back to the trace
          </a>
        </div>
      </header>
      {capture.status !== 'ready' ? (
        <div className="comparison-state">
          <Message verdict="info" title="Not measured yet" todo="Come back when the capture is ready." />
        </div>
      ) : (
        <div className="picker-body">
          {trouble !== null && <Message verdict="bad" live="alert" title={trouble} />}
          <div className="picker-tools">
            {capture.signals.length > 1 && signal !== undefined && (
              <Segmented
                label="Signal"
                value={String(signal.index)}
                onChange={(value) => setSignalIndex(Number(value))}
                options={capture.signals.map((each) => ({ value: String(each.index), text: each.name }))}
              />
            )}
            <label className="picker-search">
              <span className="sr-only">Search by engine or title</span>
              <input
                className="box"
                type="search"
                placeholder="Engine, title"
                value={search}
                onChange={(event) => setSearch(event.target.value)}
              />
            </label>
          </div>
          <section aria-labelledby="goods-title">
            <h2 id="goods-title">
              Known-goods, {circuit === undefined ? '' : circuitWords(circuit).full.toLowerCase()}
            </h2>
            {goods.error !== undefined && <Message verdict="bad" title={sentenceOf(goods.error)} />}
            {goods.data !== undefined && published.length === 0 && (
              <p className="picker-none">
                None published for this circuit{search === '' ? '' : ' under these words'}. A good capture
                becomes one by “Keep as known-good” and a review.
              </p>
            )}
            <ul>
              {bandsOf(published).map(({ good, n }) =>
                row(`band ${good.id}`, `Band of ${n}: ${engineText(good)}`, good.condition, {
                  band: {
                    engine: { make: good.engine.make, model: good.engine.model, code: good.engine.code },
                    circuit,
                    condition: good.condition,
                  },
                }),
              )}
              {published.map((good) =>
                row(good.id, engineText(good), `${good.condition}, ${good.provenance}`, {
                  knownGoodId: good.id,
                }),
              )}
            </ul>
          </section>
          {signal !== undefined && (
            <Nearest key={signal.index} id={id} signal={signal} busy={busy} onCompare={compare} />
          )}
          <section aria-labelledby="others-title">
            <h2 id="others-title">Other captures of this circuit</h2>
            {captures.data !== undefined && others.length === 0 && (
              <p className="picker-none">
                No other capture with this circuit{search === '' ? '' : ' under these words'}.
              </p>
            )}
            <ul>
              {others.map((other) =>
                row(
                  other.id,
                  other.title,
                  [timeText(other.createdAt), ...other.headline.slice(0, 1).map((each) => each.text)].join(
                    ', ',
                  ),
                  { captureId: other.id },
                ),
              )}
            </ul>
          </section>
          <Saved captureId={id} />
        </div>
      )}
    </div>
  );
}

const engineText = ({ engine }: KnownGoodRowJson) =>
  [engine.make, engine.model, engine.code, engine.year ?? ''].filter((part) => part !== '').join(' ');

/** One entry for each engine and condition that has enough known-goods for a band. */
function bandsOf(goods: readonly KnownGoodRowJson[]): { good: KnownGoodRowJson; n: number }[] {
  const groups = new Map<string, KnownGoodRowJson[]>();
  for (const good of goods) {
    const { make, model, code } = good.engine;
    const key = [make, model, code, good.condition].join('\n');
    groups.set(key, [...(groups.get(key) ?? []), good]);
  }
  return [...groups.values()]
    .filter((group) => group.length >= BAND_FROM)
    .map((group) => ({ good: group[0]!, n: group.length }));
}
