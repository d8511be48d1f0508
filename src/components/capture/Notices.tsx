import type { Notice } from '../../engine/value.ts';
import { Verdict } from '../base/Verdict.tsx';

const WORDS = { info: 'note', watch: 'look', bad: 'look first' } as const;

interface NoticesProps {
  notices: readonly Notice[];
  /** Shows the samples that the notice speaks of. */
  onShow: (notice: Notice) => void;
}

/** What a reader should know beside the numbers, each with the shape of its weight. */
export function Notices({ notices, onShow }: NoticesProps) {
  if (notices.length === 0) return null;
  return (
    <ul className="notices">
      {notices.map((notice) => (
        <li key={`${notice.code} ${notice.text}`} className="notice">
          <Verdict verdict={notice.severity} word={WORDS[notice.severity]} />
          <p>{notice.text}</p>
          {notice.evidence.length > 0 && (
            <button type="button" className="button button-quiet notice-show" onClick={() => onShow(notice)}>
              Show where
            </button>
          )}
        </li>
      ))}
    </ul>
  );
}
