import useSWR from 'swr';
import type { KnownGoodRowJson } from '../../contract/areas/library.ts';
import { fetcher } from '../base/api.ts';
import { Field } from '../base/Field.tsx';

/** Names the published known-good that this is a newer version of; those that fit the capture come first. */
export function ReplacesField({ captureId }: { captureId: string }) {
  const { data } = useSWR(
    `/known-goods?state=published&limit=50&fit=${captureId}`,
    fetcher<{ items: KnownGoodRowJson[] }>,
    { shouldRetryOnError: false, revalidateOnFocus: false },
  );
  if (data === undefined || data.items.length === 0) return null;
  return (
    <Field
      label="Replaces"
      help="Published, it takes that one’s place. What was compared with the older one stays."
    >
      <select className="choice" name="supersedes" defaultValue="">
        <option value="">nothing, it stands beside the others</option>
        {data.items.map(({ id, engine, signals, version }) => (
          <option key={id} value={id}>
            {[engine.make, engine.model, engine.code, engine.year].filter((part) => part).join(' ')},{' '}
            {signals.map((signal) => signal.name).join(' and ')}, version {version}
          </option>
        ))}
      </select>
    </Field>
  );
}
