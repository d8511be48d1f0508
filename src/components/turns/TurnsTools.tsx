import type { CaptureJson } from '../../contract/areas/captures.ts';
import { Segmented } from '../base/Segmented.tsx';

export type Laid = 'rows' | 'shade' | 'one';
/** What a row is: a turn or a cycle over degrees, or a step (turn, firing, pulse) over time. */
export type RowKind = '360' | '720' | 'Turn' | 'Firing' | 'Pulse';

interface TurnsToolsProps {
  laid: Laid;
  onLaid: (laid: Laid) => void;
  kinds: readonly RowKind[];
  kind: RowKind;
  onKind: (kind: RowKind) => void;
  signals: CaptureJson['signals'];
  /** The one signal that is shaded, or of which the value is told at the column. */
  signal: number;
  onSignal: (signal: number) => void;
}

const KIND_WORDS: Record<RowKind, string> = {
  '360': '360°',
  '720': '720°',
  Turn: 'Turns, time',
  Firing: 'Firings',
  Pulse: 'Pulses',
};

/** How the rows are laid, what a row is, and whose values are told. */
export function TurnsTools(props: TurnsToolsProps) {
  const { laid, onLaid, kinds, kind, onKind, signals, signal, onSignal } = props;
  return (
    <div className="turns-tools">
      <Segmented<Laid>
        label="Lay rows"
        value={laid}
        onChange={onLaid}
        options={[
          { value: 'rows', text: 'Under each other' },
          { value: 'shade', text: 'As shade' },
          { value: 'one', text: 'On one another' },
        ]}
      />
      {kinds.length > 1 && (
        <Segmented<RowKind>
          label="A row is"
          value={kind}
          onChange={onKind}
          options={kinds.map((value) => ({ value, text: KIND_WORDS[value] }))}
        />
      )}
      {signals.length > 1 && (
        <select
          className="choice turns-signal"
          aria-label="Signal whose values are told"
          value={signal}
          onChange={(event) => onSignal(Number(event.target.value))}
        >
          {signals.map(({ index, name }) => (
            <option key={index} value={index}>
              {name}
            </option>
          ))}
        </select>
      )}
    </div>
  );
}
