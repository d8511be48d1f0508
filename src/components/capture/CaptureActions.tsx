import './take-out.css';
import { lazy, Suspense, useState } from 'react';
import type { CaptureJson } from '../../contract/areas/captures.ts';
import { Icon } from '../base/Icon.tsx';

const ShareDialog = lazy(() => import('../share/ShareDialog.tsx').then((m) => ({ default: m.ShareDialog })));
const KeepDialog = lazy(() => import('./KeepDialog.tsx').then((m) => ({ default: m.KeepDialog })));

const TakeOutDialog = lazy(() => import('./TakeOutDialog.tsx').then((m) => ({ default: m.TakeOutDialog })));

/** Share, compare, keep: on a phone share stays in sight and the rest folds into a menu. */
export function CaptureActions({ capture, onLanes }: { capture: CaptureJson; onLanes?: () => void }) {
  const [open, setOpen] = useState<'share' | 'keep' | 'out' | null>(null);
  const close = () => setOpen(null);
  return (
    <>
      <details className="capture-more">
        <summary className="button button-icon" aria-label="More">
          <Icon name="more" />
        </summary>
        <div>
          {onLanes !== undefined && (
            <button type="button" className="button capture-folded" onClick={onLanes}>
              <Icon name="lanes" small />
              Lanes
            </button>
          )}
          <button type="button" className="button" onClick={() => setOpen('out')}>
            <Icon name="out" small />
            Take out
          </button>
          <button type="button" className="button capture-folded" onClick={() => setOpen('keep')}>
            <Icon name="keep" small />
            Keep as known-good
          </button>
          <a className="button capture-folded" href={`/captures/${capture.id}/compare`}>
            <Icon name="compare" small />
            Compare
          </a>
          <a className="button" href={`/captures/${capture.id}/reading`}>
            <Icon name="file" small />
            How the file was read
          </a>
        </div>
      </details>
      <button type="button" className="button capture-wide" onClick={() => setOpen('keep')}>
        <Icon name="keep" small />
        Keep as known-good
      </button>
      <a className="button capture-wide" href={`/captures/${capture.id}/compare`}>
        <Icon name="compare" small />
        Compare
      </a>
      <button
        type="button"
        className="button button-main"
        aria-label="Share"
        onClick={() => setOpen('share')}
      >
        <Icon name="share" small />
        <span className="capture-share-word">Share</span>
      </button>
      <Suspense fallback={null}>
        {open === 'share' && <ShareDialog capture={capture} onClose={close} />}
        {open === 'out' && <TakeOutDialog capture={capture} onClose={close} />}
        {open === 'keep' && <KeepDialog capture={capture} onClose={close} />}
      </Suspense>
    </>
  );
}
