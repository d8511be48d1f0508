import { useRef } from 'react';
import useSWRImmutable from 'swr/immutable';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import { circuitWords, ROLE_DASHES } from '../base/circuits.ts';
import { windowFetcher } from '../plot/fetch-window.ts';
import { thumbnailPath } from './thumbnail-path.ts';
import { useSeen } from './useSeen.ts';

type Drawn = Pick<CaptureJson, 'id' | 'samplesVersion' | 'startS' | 'durationS' | 'signals'>;

interface ThumbnailProps {
  capture: Drawn;
  /** Only this signal; absent: the first three, one under the other. */
  signal?: number;
  width?: number;
  height?: number;
  className?: string;
}

const MOST_LANES = 3;
const INSET = 4;

/** The whole capture, small: one lane a signal. Decoration beside words that say the same. */
export function Thumbnail({ capture, signal, width = 220, height = 72, className = '' }: ThumbnailProps) {
  const ref = useRef<SVGSVGElement>(null);
  const seen = useSeen(ref);
  const lanes = capture.signals
    .filter((each) => signal === undefined || each.index === signal)
    .slice(0, MOST_LANES);
  const drawable = seen && capture.samplesVersion > 0 && capture.durationS > 0 && lanes.length > 0;
  const { data: window } = useSWRImmutable(
    drawable ? ['thumbnail', capture.id, capture.samplesVersion, width] : null,
    () =>
      windowFetcher(`/api/v1/captures/${capture.id}/window`, capture.samplesVersion)(
        { from: capture.startS, to: capture.startS + capture.durationS, columns: Math.round(width * 0.75) },
        AbortSignal.timeout(15_000),
      ),
  );
  const laneHeight = (height - INSET) / Math.max(1, lanes.length);
  return (
    <svg
      ref={ref}
      viewBox={`0 0 ${width} ${height}`}
      preserveAspectRatio="none"
      className={`block border border-rule bg-ground ${className}`}
      aria-hidden="true"
    >
      {window !== undefined &&
        lanes.map((lane, index) => {
          const { role } = circuitWords(lane.circuit);
          const dash = ROLE_DASHES[role].join(' ');
          return (
            <path
              key={lane.index}
              className={`role-${role}`}
              d={thumbnailPath(window, lane.index, lane.factor, {
                width,
                top: INSET + index * laneHeight,
                height: laneHeight - INSET,
              })}
              fill="none"
              stroke="currentColor"
              strokeWidth="1"
              strokeDasharray={dash === '' ? undefined : dash}
              vectorEffect="non-scaling-stroke"
            />
          );
        })}
    </svg>
  );
}
