import './build.css';
import { useRef, useState } from 'react';
import type { ImportCheckJson, ImportLineJson } from '../../contract/areas/import.ts';
import { api, sentenceOf } from '../base/api.ts';
import { Button } from '../base/Button.tsx';
import { Field } from '../base/Field.tsx';
import { Message } from '../base/Message.tsx';
import { Progress } from '../base/Progress.tsx';
import { Verdict } from '../base/Verdict.tsx';
import { sendFile } from '../upload/send-file.ts';

type Sent = { readonly captureId: string } | { readonly trouble: string } | 'sending';

/** Two at once keep a poor line busy without crowding it. */
const AT_ONCE = 2;
/** More rows than this are not laid out; what is wrong comes first. */
const MOST_ROWS = 300;

const plain = (text: string) => text.normalize('NFC').toLowerCase().replace(/\s+/g, ' ').trim();

/** Many files with a table of descriptions: checked as a whole first, then sent one by one, each with its line's result. */
export function ImportPage() {
  const [files, setFiles] = useState<readonly File[]>([]);
  const [table, setTable] = useState<File | null>(null);
  const [newEngines, setNewEngines] = useState(false);
  const [check, setCheck] = useState<ImportCheckJson | null>(null);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const [sent, setSent] = useState<ReadonlyMap<number, Sent>>(new Map());
  const [sending, setSending] = useState(false);
  const stopped = useRef(false);
  const note = (line: number, what: Sent) => setSent((before) => new Map(before).set(line, what));

  const look = async (engines = newEngines) => {
    if (table === null || files.length === 0) {
      setTrouble('Choose the files, and the table that describes them.');
      return;
    }
    setBusy(true);
    setTrouble(null);
    setSent(new Map());
    try {
      const { data } = await api<ImportCheckJson>('/captures/import-check', {
        method: 'POST',
        body: { csv: await table.text(), files: files.map(({ name }) => name), newEngines: engines },
      });
      setCheck(data);
    } catch (thrown) {
      setCheck(null);
      setTrouble(sentenceOf(thrown));
    } finally {
      setBusy(false);
    }
  };

  const send = async (line: ImportLineJson) => {
    const file = files.find(({ name }) => plain(name) === plain(line.file));
    if (file === undefined) return;
    note(line.line, 'sending');
    await new Promise<void>((resolve) => {
      const end = (what: Sent) => {
        note(line.line, what);
        resolve();
      };
      sendFile(
        { file, title: line.title, cylinders: line.cylinders, note: line.note },
        {
          onSent: () => {},
          onReceived: (captureId) => end({ captureId }),
          onPaused: (happened) => end({ trouble: `${happened} Send the rest again; what arrived stays.` }),
          onRefused: ({ happened, todo }) => end({ trouble: `${happened} ${todo}` }),
        },
      ).catch(() => end({ trouble: 'It could not be sent. Send the rest again.' }));
    });
  };
  const sendAll = async () => {
    if (check === null) return;
    setSending(true);
    stopped.current = false;
    const waiting = check.lines.filter(({ line }) => {
      const state = sent.get(line);
      return state === undefined || (state !== 'sending' && 'trouble' in state);
    });
    const next = async (): Promise<void> => {
      const line = waiting.shift();
      if (line === undefined || stopped.current) return;
      await send(line);
      return next();
    };
    await Promise.all(Array.from({ length: AT_ONCE }, next));
    setSending(false);
  };

  const bad = check?.lines.filter(({ verdict }) => verdict === 'bad').length ?? 0;
  const states = [...sent.values()];
  const arrived = states.filter((state) => state !== 'sending' && 'captureId' in state).length;
  const failed = states.filter((state) => state !== 'sending' && 'trouble' in state).length;
  const shown = check === null ? [] : [...check.lines].sort(byVerdict).slice(0, MOST_ROWS);
  return (
    <div className="build">
      <section className="build-part" aria-labelledby="choose">
        <h2 id="choose">Files and their table</h2>
        <div className="build-row">
          <Field label="Captures" help="Choose all of them at once.">
            <input
              className="box"
              type="file"
              multiple
              onChange={(event) => {
                setFiles([...(event.target.files ?? [])]);
                setCheck(null);
              }}
            />
          </Field>
          <Field
            label="Table of descriptions"
            help="CSV. Its first line names the columns: file, title, note, cylinders, make, model, code, condition."
          >
            <input
              className="box"
              type="file"
              accept=".csv,.txt,.tsv,text/csv"
              onChange={(event) => {
                setTable(event.target.files?.[0] ?? null);
                setCheck(null);
              }}
            />
          </Field>
        </div>
        <label className="build-tick">
          <input
            type="checkbox"
            className="tick"
            checked={newEngines}
            onChange={(event) => {
              setNewEngines(event.target.checked);
              if (check !== null) void look(event.target.checked);
            }}
          />
          New engines are meant: the library need not know them
        </label>
        <div className="flex flex-wrap gap-2">
          <Button kind={check?.fits ? 'plain' : 'main'} busy={busy} onClick={() => look()}>
            Check the table
          </Button>
        </div>
        {trouble !== null && (
          <Message
            verdict="bad"
            live="alert"
            title="The table cannot be taken"
            happened={trouble}
            kept="Nothing was sent."
          />
        )}
      </section>
      {check !== null && (
        <section className="build-part" aria-labelledby="lines">
          <h2 id="lines">Line by line</h2>
          {bad > 0 && (
            <Message
              verdict="bad"
              live="status"
              title={`${bad} of ${check.lines.length} lines need attention`}
              happened="Nothing is sent until every line fits."
              todo="Mend the table, choose it again and check."
            />
          )}
          {check.fits && states.length === 0 && (
            <Message
              verdict="good"
              live="status"
              title={`${check.lines.length} ${check.lines.length === 1 ? 'line fits' : 'lines fit'}`}
              happened="Each file becomes a capture together with its description, or not at all."
            />
          )}
          {check.without.length > 0 && (
            <p className="text-soft">
              {check.without.length} chosen {check.without.length === 1 ? 'file has' : 'files have'} no line
              and stay out: {check.without.slice(0, 5).join(', ')}
              {check.without.length > 5 && ' …'}
            </p>
          )}
          {states.length > 0 && (
            <Progress
              label={sending ? 'Sending' : failed > 0 ? 'Sent in part' : 'Sent'}
              value={arrived / check.lines.length}
              figure={`${arrived} of ${check.lines.length} arrived${failed > 0 ? `, ${failed} not` : ''}`}
            />
          )}
          <div className="flex flex-wrap gap-2">
            {check.fits && arrived < check.lines.length && (
              <Button kind="main" icon="upload" busy={sending} onClick={sendAll}>
                {states.length === 0
                  ? `Send ${check.lines.length}`
                  : `Send the rest (${check.lines.length - arrived})`}
              </Button>
            )}
            {sending && (
              <Button
                icon="pause"
                onClick={() => {
                  stopped.current = true;
                }}
              >
                Stop after this
              </Button>
            )}
          </div>
          <ol className="build-list">
            {shown.map((line) => (
              <li key={line.line}>
                <span className="figures text-soft">line {line.line}</span>
                <span className="grow">
                  <b>{line.title ?? line.file}</b>{' '}
                  {line.title !== null && <span className="text-soft">{line.file}</span>}
                  {line.text !== '' && <span className="block">{line.text}</span>}
                </span>
                <LineState line={line} state={sent.get(line.line)} />
              </li>
            ))}
          </ol>
          {check.lines.length > shown.length && (
            <p className="text-soft">
              {shown.length} of {check.lines.length} lines are shown, those that need attention first.
            </p>
          )}
        </section>
      )}
    </div>
  );
}

const RANK = { bad: 0, watch: 1, good: 2 } as const;
const byVerdict = (a: ImportLineJson, b: ImportLineJson) =>
  RANK[a.verdict] - RANK[b.verdict] || a.line - b.line;

function LineState({ line, state }: { line: ImportLineJson; state: Sent | undefined }) {
  if (state === 'sending') return <span className="text-soft">sending …</span>;
  if (state !== undefined && 'captureId' in state)
    return (
      <a className="link" href={`/captures/${state.captureId}`}>
        arrived
      </a>
    );
  if (state !== undefined) return <Verdict verdict="bad" word={state.trouble} />;
  const word = { good: 'fits', watch: 'look', bad: 'does not fit' }[line.verdict];
  return <Verdict verdict={line.verdict} word={word} />;
}
