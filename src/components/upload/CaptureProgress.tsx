import { useEffect, useRef, useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { Circuit } from '../../engine/circuit.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button, buttonClass } from '../base/Button.tsx';
import { Message } from '../base/Message.tsx';
import { bytesText, grouped } from '../base/numbers.ts';
import { Progress } from '../base/Progress.tsx';
import { isUnderWay } from '../captures/words.ts';
import { changeCapture } from './change-capture.ts';
import { ProposedCircuit } from './ProposedCircuit.tsx';
import { Step } from './Step.tsx';
import { readAs, rejectedWords, stepWords } from './understood.ts';
import { useCapture } from './useCapture.ts';

interface CaptureProgressProps {
  id: string;
  onClose: () => void;
  /** The list beside it is out of date: the capture has come to a new state. */
  onChange: () => void;
}

const percent = (part: number) => `${Math.floor(part * 100)} %`;

/** From the received file to its numbers: steps, what was understood, circuits to confirm, and the way on. */
export function CaptureProgress({ id, onClose, onChange }: CaptureProgressProps) {
  const { data: seen, error, mutate } = useCapture(id);
  const [confirmed, setConfirmed] = useState<ReadonlySet<number>>(new Set());
  const [acting, setActing] = useState<string | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const tell = useRef(onChange);
  tell.current = onChange;
  const status = seen?.data.status;
  useEffect(() => {
    if (status !== undefined) tell.current();
  }, [status]);
  if (seen === undefined) {
    if (error === undefined) return <Progress label="Received, waits its turn" />;
    return (
      <Message
        verdict="watch"
        live="status"
        title="How far it is cannot be seen just now"
        happened={sentenceOf(error)}
        kept="The file has arrived and is read without this page."
      />
    );
  }
  const capture = seen.data;
  const act = async (what: string, work: () => Promise<unknown>) => {
    setActing(what);
    setTrouble(null);
    try {
      await work();
      await mutate();
      onChange();
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
    }
    setActing(null);
  };
  const choose = (column: number, circuit: Circuit) =>
    act(`choose ${column}`, () => changeCapture(seen, { signals: [{ column, circuit }] }));
  const underWay = isUnderWay(capture.status);
  const asking = capture.signals.filter((signal) => !confirmed.has(signal.index));

  return (
    <div className="grid gap-3">
      <Steps capture={capture} />
      {capture.status === 'failed' && (
        <Message
          verdict="bad"
          live="alert"
          title="This file could not be read"
          happened={capture.error?.message ?? 'No reason was given.'}
          kept={`The file as it came, ${bytesText(capture.bytes)}.`}
          todo={capture.error?.hint}
          actions={
            <a className={buttonClass('main', true)} href={`/captures/${id}/reading`}>
              See the rows
            </a>
          }
        />
      )}
      {capture.status === 'cancelled' && (
        <Message
          verdict="undecided"
          live="status"
          title="Stopped"
          kept={`The file as it came, ${bytesText(capture.bytes)}.`}
          actions={
            <Button
              small
              busy={acting === 'again'}
              onClick={() => act('again', () => changeCapture(seen, { reading: {} }))}
            >
              Read it again
            </Button>
          }
        />
      )}
      {capture.status === 'ready' && (
        <div className="flex flex-wrap gap-2">
          <a className={buttonClass('main')} href={`/captures/${id}`}>
            Open the trace
          </a>
          <a className={buttonClass()} href={`/captures/${id}/reading`}>
            How it was read
          </a>
        </div>
      )}
      {asking.length > 0 && capture.status !== 'cancelled' && (
        <ul className="grid gap-2" aria-label="Circuits to confirm">
          {asking.slice(0, 4).map((signal) => (
            <ProposedCircuit
              key={signal.index}
              capture={capture}
              signal={signal}
              busy={acting === `choose ${signal.column}`}
              onYes={() => setConfirmed(new Set([...confirmed, signal.index]))}
              onOther={(circuit) => {
                setConfirmed(new Set([...confirmed, signal.index]));
                void choose(signal.column, circuit);
              }}
            />
          ))}
        </ul>
      )}
      {capture.reading !== null && <Understood capture={capture} reading={capture.reading} />}
      {trouble !== null && (
        <Message verdict="bad" live="alert" title="That did not work" happened={trouble} />
      )}
      <div className="flex flex-wrap items-center justify-between gap-2">
        <p className="text-dense text-soft">{underWay && 'You can leave. It goes on without you.'}</p>
        {underWay ? (
          <Button
            small
            busy={acting === 'cancel'}
            onClick={() => act('cancel', () => api(`/captures/${id}/cancel`, { method: 'POST', body: {} }))}
          >
            Cancel
          </Button>
        ) : (
          <Button small kind="quiet" onClick={onClose}>
            Put away
          </Button>
        )}
      </div>
    </div>
  );
}

function Steps({ capture }: { capture: CaptureJson }) {
  const { status, progress, reading } = capture;
  const read = reading !== null && status !== 'reading';
  const readingFigure =
    status === 'reading'
      ? percent(progress)
      : read
        ? `${grouped(reading.rows)} rows`
        : status === 'queued'
          ? 'waits its turn'
          : '';
  return (
    <ol className="grid gap-2">
      <Step name="Received" state="done" figure={`${bytesText(capture.bytes)}, sum taken`} />
      <Step
        name="Reading rows"
        state={status === 'reading' ? 'now' : read ? 'done' : status === 'failed' ? 'stopped' : 'waits'}
        figure={readingFigure}
        part={status === 'reading' ? progress : undefined}
      />
      <Step
        name="Measuring"
        state={status === 'measuring' ? 'now' : status === 'ready' ? 'done' : 'waits'}
        figure={status === 'measuring' ? percent(progress) : status === 'ready' ? 'done' : 'waits'}
        part={status === 'measuring' ? progress : undefined}
      />
    </ol>
  );
}

function Understood({
  capture,
  reading,
}: {
  capture: CaptureJson;
  reading: NonNullable<CaptureJson['reading']>;
}) {
  const rejected = rejectedWords(reading);
  return (
    <dl className="message-facts text-dense">
      <dt>Read as</dt>
      <dd>{readAs(reading)}</dd>
      <dt>Step</dt>
      <dd className="figures">{stepWords(capture)}</dd>
      {rejected !== null && (
        <>
          <dt>Rejected</dt>
          <dd>{rejected}</dd>
        </>
      )}
      {reading.remarks.map((remark) => (
        <div key={remark} className="contents">
          <dt>Remark</dt>
          <dd>{remark}</dd>
        </div>
      ))}
    </dl>
  );
}
