export const VERDICTS = ['good', 'watch', 'bad', 'undecided', 'info'] as const;
export type VerdictName = (typeof VERDICTS)[number];

/** Disc good, triangle watch, diamond bad, dashed ring undecided, square info. */
export function VerdictShape({ verdict }: { verdict: VerdictName }) {
  return (
    <svg viewBox="-6 -6 12 12" width="12" height="12" aria-hidden="true" fill="currentColor">
      {verdict === 'good' && <circle r="5" />}
      {verdict === 'watch' && <path d="M0-5.5L6 5.5H-6z" />}
      {verdict === 'bad' && <path d="M0-6L6 0L0 6L-6 0z" />}
      {verdict === 'undecided' && (
        <circle r="4.6" fill="none" stroke="currentColor" strokeWidth="1.8" strokeDasharray="2.2 1.4" />
      )}
      {verdict === 'info' && <path d="M-4.5-4.5H4.5V4.5H-4.5z" />}
    </svg>
  );
}

/** A shape and always a word. */
export function Verdict({ verdict, word }: { verdict: VerdictName; word: string }) {
  return (
    <span className={`verdict verdict-${verdict}`}>
      <VerdictShape verdict={verdict} />
      <span>{word}</span>
    </span>
  );
}
