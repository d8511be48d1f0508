import { type FormEvent, useEffect, useRef, useState } from 'react';
import type { CheckJson, JobCheckJson } from '../../contract/areas/path.ts';
import { ApiFailure, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';
import { VerdictShape } from '../base/Verdict.tsx';
import { type Draft, dropDraft, keepDraft, readDraft } from './drafts.ts';
import { SHAPE } from './result-shape.ts';
import { sendCheck } from './send-check.ts';

interface CheckFormProps {
  jobId: string;
  check: CheckJson;
  present: JobCheckJson;
  onSaved: () => void;
  onClose: () => void;
}

const RESULTS = ['good', 'bad', 'unclear', 'skipped'] as const;

/** Records one check: cautions first, then the numbers, the result by thumb, and what was found. */
export function CheckForm({ jobId, check, present, onSaved, onClose }: CheckFormProps) {
  const [draft, setDraft] = useState<Draft>(() => readDraft(jobId, check.check) ?? draftOf(present));
  const [problem, setProblem] = useState('');
  const [details, setDetails] = useState<ApiFailure['details']>([]);
  const [busy, setBusy] = useState(false);
  const head = useRef<HTMLHeadingElement>(null);
  useEffect(() => head.current?.focus(), []);
  const change = (part: Partial<Draft>) => {
    const changed = { ...draft, ...part, waitingSince: null };
    setDraft(changed);
    keepDraft(jobId, check.check, changed);
  };
  const save = async (event: FormEvent) => {
    event.preventDefault();
    if (draft.result === null) return setProblem('Say what it showed: good, bad, unclear or skipped.');
    setBusy(true);
    setDetails([]);
    try {
      await sendCheck(jobId, check.check, draft);
      dropDraft(jobId, check.check);
      onSaved();
    } catch (thrown) {
      const away = thrown instanceof ApiFailure && thrown.status === 0;
      const waiting = { ...draft, waitingSince: away ? new Date().toISOString() : null };
      const kept = keepDraft(jobId, check.check, waiting);
      setDraft(waiting);
      setDetails(thrown instanceof ApiFailure ? thrown.details : []);
      setProblem(
        away
          ? kept
            ? 'No connection. Kept on this device, sent when the line is back.'
            : 'No connection, and this device keeps nothing: leave this page open.'
          : sentenceOf(thrown),
      );
    } finally {
      setBusy(false);
    }
  };
  const findings = check.findings.filter(({ result }) => result === draft.result);
  const keys = Object.keys(draft.readings);
  return (
    <form className="path-form" onSubmit={save} aria-labelledby="path-form-head" noValidate>
      <h2 id="path-form-head" ref={head} tabIndex={-1}>
        {check.title}
      </h2>
      {check.cautions.length > 0 && (
        <ol className="path-form-cautions">
          {check.cautions.map((caution) => (
            <li key={caution}>{caution}</li>
          ))}
        </ol>
      )}
      <p>{check.question}</p>
      <p className="path-how">{check.how}</p>
      {present.measured.map((one) => (
        <p key={one.captureId + one.reading + one.from} className="path-measured">
          {one.what} <b>{Number(one.value.toPrecision(4))}</b> {one.unit === '1' ? '' : one.unit}, from{' '}
          <a href={`/captures/${one.captureId}`}>{one.from}</a>
          {one.remark !== null && `. ${one.remark}`}
        </p>
      ))}
      {check.readings.map(({ reading, what, unit, units, expected }) => {
        const at = draft.readings[reading] ?? { value: '', unit };
        const put = (part: Partial<typeof at>) =>
          change({ readings: { ...draft.readings, [reading]: { ...at, ...part } } });
        const sent = keys.filter((key) => (draft.readings[key]?.value ?? '').trim() !== '').indexOf(reading);
        const error =
          details.find(({ path }) => sent >= 0 && path.startsWith(`readings.${sent}.`))?.message ?? null;
        return (
          <div key={reading} className="path-reading">
            <Field
              label={what}
              error={error}
              {...(expected === null ? {} : { help: `Expected: ${expected.text} (${expected.source.text})` })}
            >
              <input
                inputMode="decimal"
                autoComplete="off"
                value={at.value}
                onChange={(event) => put({ value: event.target.value })}
              />
            </Field>
            {units.length > 1 ? (
              <select
                aria-label={`Unit of ${what}`}
                value={at.unit}
                onChange={(event) => put({ unit: event.target.value })}
              >
                {units.map((one) => (
                  <option key={one}>{one}</option>
                ))}
              </select>
            ) : (
              <span className="path-unit">{unit === '1' ? '' : unit}</span>
            )}
          </div>
        );
      })}
      {check.check === 'codes' && (
        <Field label="Codes" help="One a line or between commas; unknown ones are kept as typed.">
          <textarea
            rows={3}
            value={draft.codes}
            onChange={(event) => change({ codes: event.target.value })}
          />
        </Field>
      )}
      <fieldset className="path-results">
        <legend>Result</legend>
        {RESULTS.map((result) => (
          <label key={result} data-chosen={draft.result === result || undefined}>
            <input
              type="radio"
              name="result"
              value={result}
              checked={draft.result === result}
              onChange={() => change({ result, finding: null })}
            />
            <span className={`verdict-${SHAPE[result]}`}>
              <VerdictShape verdict={SHAPE[result]} />
            </span>
            <span>{result}</span>
          </label>
        ))}
      </fieldset>
      {findings.length > 0 && (
        <fieldset className="path-findings">
          <legend>What was seen</legend>
          {findings.map(({ finding, says }) => (
            <label key={finding}>
              <input
                type="radio"
                name="finding"
                value={finding}
                checked={draft.finding === finding}
                onChange={() => change({ finding })}
              />
              <span>{says}</span>
            </label>
          ))}
        </fieldset>
      )}
      <Field label="Note (may stay empty)">
        <textarea
          rows={3}
          maxLength={4000}
          value={draft.note}
          onChange={(event) => change({ note: event.target.value })}
        />
      </Field>
      <Field label="It stands, because (only where something speaks against it)">
        <input
          maxLength={1000}
          value={draft.stands}
          onChange={(event) => change({ stands: event.target.value })}
        />
      </Field>
      {problem !== '' && <p role="alert">{problem}</p>}
      <p className="path-form-actions">
        <Button type="button" onClick={onClose}>
          Back
        </Button>
        <Button type="submit" kind="main" busy={busy}>
          Save, then next check
        </Button>
      </p>
    </form>
  );
}

function draftOf({ record }: JobCheckJson): Draft {
  const readings = (record?.readings ?? []).map(
    ({ what, value, unit }) => [what, { value: String(value), unit }] as const,
  );
  return {
    result: record?.result ?? null,
    finding: record?.finding ?? null,
    readings: Object.fromEntries(readings),
    codes: (record?.codes ?? []).join(', '),
    note: record?.note ?? '',
    stands: record?.stands ?? '',
    captureIds: record?.captureIds ?? [],
    etag: record?.etag ?? '"0"',
    waitingSince: null,
  };
}
