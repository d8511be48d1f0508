import { useCallback, useState } from 'react';
import useSWR from 'swr';
import type { CheckJson, JobCheckJson, NextJson } from '../../contract/areas/path.ts';
import { fetcher, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Message } from '../base/Message.tsx';
import { Skeleton } from '../base/Skeleton.tsx';
import { CauseList } from './CauseList.tsx';
import { CheckForm } from './CheckForm.tsx';
import { NextChecks } from './NextChecks.tsx';
import { PathSteps } from './PathSteps.tsx';
import { useWaiting } from './useWaiting.ts';
import './path.css';

const COMPLAINT: Readonly<Record<NextJson['complaint'], string>> = {
  'cranks-no-start': 'cranks, does not start',
  'slow-crank': 'turns slowly or not at all',
  misfire: 'runs, misfires',
  stall: 'starts, then dies',
};

/** The path of eliminations of a job, with what to check next and why. */
export function PathOfChecks({ jobId, closed }: { jobId: string; closed: boolean }) {
  const path = useSWR<NextJson, unknown>(`/jobs/${jobId}/next`, fetcher);
  const checks = useSWR<{ items: CheckJson[] }, unknown>('/checks', fetcher, { revalidateOnFocus: false });
  const [open, setOpen] = useState<string | null>(null);
  const present = useSWR<JobCheckJson, unknown>(
    open === null ? null : `/jobs/${jobId}/checks/${open}`,
    fetcher,
    {
      revalidateOnFocus: false,
    },
  );
  const refresh = path.mutate;
  const waiting = useWaiting(
    jobId,
    useCallback(() => void refresh(), [refresh]),
  );
  const next = path.data;
  const chosen = checks.data?.items.find(({ check }) => check === open);
  if (next === undefined) {
    return path.error === undefined ? (
      <Skeleton />
    ) : (
      <Message
        verdict="bad"
        title="The path could not be loaded"
        happened={sentenceOf(path.error)}
        live="alert"
      />
    );
  }
  const shown = next.causes.filter(({ state }) => state === 'shown');
  const left = (
    <>
      <NextChecks next={next} onOpen={setOpen} />
      <CauseList
        jobId={jobId}
        causes={next.causes}
        onChange={(data) => void refresh(data, { revalidate: false })}
      />
    </>
  );
  return (
    <div className="path">
      {open !== null && chosen !== undefined && present.data !== undefined && !present.isLoading ? (
        <CheckForm
          key={open}
          jobId={jobId}
          check={chosen}
          present={present.data}
          onClose={() => setOpen(null)}
          onSaved={() => {
            setOpen(null);
            void present.mutate(undefined, { revalidate: false });
            void refresh();
          }}
        />
      ) : (
        <section className="path-main" aria-labelledby="path-head">
          <h2 id="path-head">
            Path of eliminations <small>Solid: taken. Dashed: not taken.</small>
          </h2>
          <p>
            {COMPLAINT[next.complaint]}
            {next.complaintGuessed && ', guessed from the complaint. '}
            <Button small kind="quiet" onClick={() => setOpen('complaint')}>
              Change
            </Button>
          </p>
          {open !== null && present.error !== undefined && <p role="alert">{sentenceOf(present.error)}</p>}
          {waiting > 0 && <p role="status">{waiting} on this device, sent when the line is back.</p>}
          {next.alerts.map((alert) => (
            <Message key={alert} verdict="watch" title={alert} />
          ))}
          {next.contradictions.map(({ text, kind }) => (
            <Message
              key={text}
              verdict="bad"
              title={`Does not agree: ${kind}`}
              happened={text}
              todo="Take the check again, or open it and say why it stands. Until then neither counts."
            />
          ))}
          <PathSteps steps={next.steps} onOpen={setOpen} />
          {shown.map(({ cause, name, prove }) => (
            <Message
              key={cause}
              verdict="info"
              title={`Shown: ${name}`}
              happened={prove}
              todo="Prove it after the repair with the same check. The maker’s service information comes first."
            />
          ))}
        </section>
      )}
      <div className="path-side">
        {closed ? (
          <details>
            <summary>The job is closed. What was left to check</summary>
            {left}
          </details>
        ) : (
          left
        )}
        <p className="path-foot">
          It weighs what was recorded by common practice and certifies nothing. The maker’s service
          information, local rules and a qualified technician’s judgement come first.
        </p>
      </div>
    </div>
  );
}
