import type { ReactNode } from 'react';
import type { JobJson } from '../../contract/areas/jobs.ts';
import { timeText } from '../base/numbers.ts';
import { Verdict } from '../base/Verdict.tsx';
import { jobName, STATE_WORDS, vehicleText } from './words.ts';

interface JobHeadProps {
  job: JobJson;
  timeZone: string;
  /** Buttons. */
  children: ReactNode;
}

/** Complaint and vehicle on top, with the state and what can be done. */
export function JobHead({ job, timeZone, children }: JobHeadProps) {
  const { vehicle } = job;
  const cells = [
    { label: 'Vehicle', value: vehicleText(vehicle) },
    { label: 'Engine', value: engineText(vehicle) },
    { label: 'Plate', value: vehicle.plate || 'none entered', figures: vehicle.plate !== '' },
    { label: 'VIN', value: vehicle.vin || 'none entered', figures: vehicle.vin !== '' },
    { label: 'Codes', value: job.codes.join(' ') || 'none entered', figures: job.codes.length > 0 },
    { label: 'In', value: timeText(job.createdAt, timeZone), figures: true },
    { label: 'Works on it', value: job.assignee?.name ?? 'nobody yet' },
  ];
  return (
    <header>
      <div className="title-row">
        <div className="min-w-0 basis-96 grow">
          <p className="narrow text-caption text-soft">Complaint, {jobName(job.number)}</p>
          <h1 className="max-w-[72ch] break-words">{job.complaint}</h1>
        </div>
        <Verdict {...STATE_WORDS[job.state]} />
        <div className="title-actions">{children}</div>
      </div>
      <dl className="grid grid-cols-2 border-b border-rule desk:flex desk:flex-wrap">
        {cells.map((cell) => (
          <div
            key={cell.label}
            className="min-w-0 px-(--margin) py-1.5 not-first:border-rule desk:border-l desk:px-4 desk:first:border-l-0 desk:first:pl-(--margin)"
          >
            <dt className="narrow text-cell text-soft">{cell.label}</dt>
            <dd className={`text-dense font-medium break-words ${cell.figures ? 'figures' : ''}`}>
              {cell.value}
            </dd>
          </div>
        ))}
      </dl>
      {job.vinWarning !== null && (
        <p className="border-b border-rule px-(--margin) py-2 text-dense">
          <Verdict verdict="watch" word={`VIN: ${job.vinWarning}`} />
        </p>
      )}
    </header>
  );
}

const engineText = ({ engine, cylinders }: JobJson['vehicle']): string =>
  [cylinders === null ? '' : `${cylinders} cylinders`, engine].filter((part) => part !== '').join(', ') ||
  'not said';
