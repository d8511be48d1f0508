import './capture.css';
import './wheel.css';
import type { MeasurementsJson } from '../../contract/areas/captures.ts';
import type { IrregularTooth } from '../../engine/value.ts';
import { sentenceOf } from '../base/api.ts';
import { Message } from '../base/Message.tsx';
import { fixed } from '../plot/format.ts';
import { CaptureActions } from './CaptureActions.tsx';
import { CaptureHead } from './CaptureHead.tsx';
import { CaptureGone, CaptureSkeleton, CaptureState } from './CaptureState.tsx';
import { useCapture, useFindings } from './use-capture.ts';
import { Wheel } from './Wheel.tsx';

/** The capture's second tab: the trigger wheel as the trace shows it. */
export function CaptureWheel({ id }: { id: string }) {
  const loaded = useCapture(id);
  const capture = loaded.data?.data;
  const { measurements, wheel } = useFindings(id, capture);
  if (capture === undefined)
    return loaded.error === undefined ? <CaptureSkeleton /> : <CaptureGone error={loaded.error} />;
  const ready = capture.status === 'ready';
  return (
    <div className="capture-flow">
      <CaptureHead capture={capture} tab="wheel" actions={<CaptureActions capture={capture} />} />
      {!ready && <CaptureState capture={capture} onChange={() => void loaded.mutate()} />}
      {ready && wheel.error !== undefined && (
        <div className="capture-state">
          <Message
            verdict="bad"
            live="alert"
            title="The wheel could not be loaded"
            happened={sentenceOf(wheel.error)}
          />
        </div>
      )}
      {ready && wheel.data === null && (
        <div className="capture-state">
          <Message
            verdict="info"
            title="No trigger wheel was found in this capture"
            happened={reasonOf(measurements.data) ?? 'It holds no crank signal with a pattern that repeats.'}
            todo="Record two turns or more of the crank signal while cranking. If a signal is a crank sensor, say so where the file’s reading is shown."
            actions={
              <a className="button" href={`/captures/${id}/reading`}>
                How the file was read
              </a>
            }
          />
        </div>
      )}
      {ready && wheel.data != null && (
        <Wheel
          captureId={id}
          wheel={wheel.data}
          irregular={irregularOf(measurements.data, wheel.data.signal)}
          speed={speedOf(measurements.data, wheel.data.signal)}
        />
      )}
      {ready && wheel.data === undefined && wheel.error === undefined && <CaptureSkeleton />}
    </div>
  );
}

const valueUnder = (measurements: MeasurementsJson | undefined, signal: number, key: string) =>
  measurements?.signals.find((each) => each.index === signal)?.values.find((value) => value.key === key);

function irregularOf(measurements: MeasurementsJson | undefined, signal: number): readonly IrregularTooth[] {
  const value = valueUnder(measurements, signal, 'irregular_teeth')?.value;
  return Array.isArray(value) ? value.filter((each) => typeof each === 'object' && each !== null) : [];
}

function speedOf(measurements: MeasurementsJson | undefined, signal: number): string | null {
  const value = valueUnder(measurements, signal, 'rpm_mean')?.value;
  return typeof value === 'number' ? `${fixed(value, 1)} rpm` : null;
}

/** Why the pattern is missing, as the engine says it. */
function reasonOf(measurements: MeasurementsJson | undefined): string | null {
  for (const signal of measurements?.signals ?? []) {
    const pattern = signal.values.find((value) => value.key === 'wheel_pattern');
    if (pattern?.reason !== undefined) return pattern.reason;
  }
  return null;
}
