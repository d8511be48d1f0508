import type { CaptureJson } from '../../contract/areas/captures.ts';
import type { Circuit } from '../../engine/circuit.ts';
import { Button } from '../base/Button.tsx';
import { circuitWords } from '../base/circuits.ts';
import { LineSample } from '../base/LineSample.tsx';
import { Thumbnail } from '../captures/Thumbnail.tsx';
import { asSentence, sureness } from '../captures/words.ts';
import { CircuitChoice } from './CircuitChoice.tsx';

interface ProposedCircuitProps {
  capture: CaptureJson;
  signal: CaptureJson['signals'][number];
  busy: boolean;
  onYes: () => void;
  onOther: (circuit: Circuit) => void;
}

/** "KW looks like crank, two-wire": yes, or another circuit. */
export function ProposedCircuit({ capture, signal, busy, onYes, onOther }: ProposedCircuitProps) {
  const words = circuitWords(signal.circuit);
  const sure = sureness(signal.circuitConfidence);
  const because = signal.circuitBecause === '' ? '' : `: ${signal.circuitBecause}`;
  const sentence = asSentence(`${sure.word}, ${signal.circuitConfidence.toFixed(2)}${because}`);
  return (
    <li className="overflow-hidden border border-rule">
      <Thumbnail
        capture={capture}
        signal={signal.index}
        width={300}
        height={56}
        className="h-14 w-full border-x-0 border-t-0"
      />
      <div className="grid gap-2 p-3">
        <p className="flex flex-wrap items-baseline gap-x-2">
          <span className="self-center">
            <LineSample role={words.role} />
          </span>
          <span className="figures">{signal.name}</span>
          <span>looks like</span>
          <strong>{words.full.toLowerCase()}</strong>
        </p>
        <p className="text-dense text-soft">{sentence}</p>
        <div className="flex gap-2">
          <Button kind="main" small busy={busy} onClick={onYes}>
            Yes
          </Button>
          <div className="min-w-0 grow">
            <CircuitChoice
              label={`Another circuit for ${signal.name}`}
              value=""
              placeholder="Another circuit"
              disabled={busy}
              onChange={onOther}
            />
          </div>
        </div>
      </div>
    </li>
  );
}
