import { Button } from '../base/Button.tsx';
import { Icon } from '../base/Icon.tsx';
import { UnfinishedList } from './UnfinishedList.tsx';
import { UploadRow } from './UploadRow.tsx';
import type { Uploads } from './useUploads.ts';

interface UploadPanelProps {
  uploads: Uploads;
  /** Files hang over the page. */
  over: boolean;
  onChoose: () => void;
  onSample: () => void;
  onChange: () => void;
}

/** Drop zone, files on their way, and what was left unfinished before. */
export function UploadPanel({ uploads, over, onChoose, onSample, onChange }: UploadPanelProps) {
  return (
    <>
      <div
        className={`hidden justify-items-center gap-2 border border-dashed px-4 py-6 text-center desk:grid ${over ? 'border-accent bg-wash' : 'border-line bg-ground'}`}
      >
        <span className="text-accent">
          <Icon name="upload" />
        </span>
        <h2 className="text-head">Drop a CSV here</h2>
        <p className="text-soft">
          Comma, semicolon or tab, decimal point or comma, any time unit. The file itself is kept as it came.
        </p>
        <div className="mt-2 flex flex-wrap justify-center gap-2">
          <Button onClick={onChoose}>Choose a file</Button>
          <Button onClick={onSample}>Try a sample</Button>
        </div>
      </div>
      {uploads.items.length > 0 && (
        <ul aria-label="Files on their way">
          {[...uploads.items].reverse().map((item) => (
            <UploadRow key={item.key} item={item} uploads={uploads} onChange={onChange} />
          ))}
        </ul>
      )}
      <UnfinishedList onChoose={onChoose} />
    </>
  );
}
