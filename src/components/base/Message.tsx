import type { ReactNode } from 'react';
import { type VerdictName, VerdictShape } from './Verdict.tsx';

interface MessageProps {
  verdict: VerdictName;
  title: string;
  happened?: ReactNode;
  kept?: ReactNode;
  todo?: ReactNode;
  /** Buttons, last. */
  actions?: ReactNode;
  /** `alert` interrupts a screen reader, `status` waits; absent: neither (server-rendered). */
  live?: 'alert' | 'status';
  children?: ReactNode;
}

/** What happened, what was kept, what to do. */
export function Message({ verdict, title, happened, kept, todo, actions, live, children }: MessageProps) {
  const facts = [
    ['Happened', happened],
    ['Kept', kept],
    ['Do', todo],
  ] as const;
  return (
    <div className={`message message-${verdict}`} role={live}>
      <p className="message-title">
        <span className={`verdict-${verdict}`}>
          <VerdictShape verdict={verdict} />
        </span>
        <span>{title}</span>
      </p>
      {facts.some(([, text]) => text !== undefined && text !== '') && (
        <dl className="message-facts">
          {facts.map(
            ([name, text]) =>
              text !== undefined &&
              text !== '' && (
                <div key={name} className="contents">
                  <dt>{name}</dt>
                  <dd>{text}</dd>
                </div>
              ),
          )}
        </dl>
      )}
      {children}
      {actions !== undefined && <div className="message-actions">{actions}</div>}
    </div>
  );
}
