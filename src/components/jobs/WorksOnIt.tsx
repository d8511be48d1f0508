import { useId, useState } from 'react';
import type { JobJson } from '../../contract/areas/jobs.ts';
import { ApiFailure, api, sentenceOf } from '../base/api.ts';
import { Message } from '../base/Message.tsx';
import { Segmented } from '../base/Segmented.tsx';

interface WorksOnItProps {
  job: JobJson;
  people: readonly { readonly id: string; readonly name: string }[];
  onChanged: (job: JobJson) => void;
  onStale: () => void;
}

const STATES = [
  { value: 'open', text: 'At work' },
  { value: 'waiting', text: 'Waiting' },
] as const;

/** Who has the job now, and whether it waits for something. */
export function WorksOnIt({ job, people, onChanged, onStale }: WorksOnItProps) {
  const id = useId();
  const [trouble, setTrouble] = useState<string | null>(null);
  const send = async (body: Record<string, unknown>) => {
    setTrouble(null);
    try {
      const { data } = await api<JobJson>(`/jobs/${job.id}`, { method: 'PATCH', body, etag: job.etag });
      onChanged(data);
    } catch (thrown) {
      setTrouble(sentenceOf(thrown));
      if (thrown instanceof ApiFailure && thrown.status === 412) onStale();
    }
  };
  const gone = job.assignee !== null && !people.some((person) => person.id === job.assignee?.id);
  return (
    <section aria-label="Who works on it" className="grid gap-3 border-b border-rule px-(--margin) py-4">
      <div className="field">
        <label className="field-label" htmlFor={id}>
          Works on it
        </label>
        <select
          id={id}
          className="choice"
          value={job.assignee?.id ?? ''}
          onChange={(event) => send({ assigneeId: event.target.value === '' ? null : event.target.value })}
        >
          <option value="">nobody yet</option>
          {gone && <option value={job.assignee?.id}>{job.assignee?.name}, no longer here</option>}
          {people.map((person) => (
            <option key={person.id} value={person.id}>
              {person.name}
            </option>
          ))}
        </select>
      </div>
      {job.state !== 'closed' && (
        <Segmented
          label="State"
          options={STATES}
          value={job.state}
          onChange={(state) => {
            if (state !== job.state) void send({ state });
          }}
        />
      )}
      {trouble !== null && (
        <Message verdict="bad" live="alert" title="The change was not kept" happened={trouble} />
      )}
    </section>
  );
}
