import { useState } from 'react';
import type { ShareLinkJson } from '../../contract/areas/sharing.ts';
import { timeText } from '../base/numbers.ts';

interface LinkListProps {
  links: readonly ShareLinkJson[];
  onWithdraw: (link: ShareLinkJson) => void;
}

/** Links of a capture, without their addresses: how often each was seen and answered, and how to end it. */
export function LinkList({ links, onWithdraw }: LinkListProps) {
  const [asking, setAsking] = useState<string | null>(null);
  if (links.length === 0) return null;
  return (
    <section className="share-links" aria-labelledby="links-title">
      <h3 id="links-title">Links made</h3>
      <ul>
        {links.map((link) => {
          const ended = link.withdrawnAt !== null || Date.parse(link.expiresAt) <= Date.now();
          return (
            <li key={link.id}>
              <div>
                <p>{link.question || 'Without a question'}</p>
                <p className="text-soft">
                  {link.withdrawnAt !== null
                    ? 'withdrawn'
                    : `${ended ? 'ended' : 'open to'} ${timeText(link.expiresAt)}`}
                  , seen {times(link.seen)}, {link.answers === 1 ? '1 answer' : `${link.answers} answers`}
                </p>
              </div>
              {!ended && asking !== link.id && (
                <button type="button" className="button button-quiet" onClick={() => setAsking(link.id)}>
                  Withdraw
                </button>
              )}
              {asking === link.id && (
                <div className="share-sure" role="alert">
                  <p>It stops opening at once. Answers stay.</p>
                  <button
                    type="button"
                    className="button button-small button-bad"
                    onClick={() => {
                      setAsking(null);
                      onWithdraw(link);
                    }}
                  >
                    Withdraw the link
                  </button>
                  <button type="button" className="button button-small" onClick={() => setAsking(null)}>
                    Keep it
                  </button>
                </div>
              )}
            </li>
          );
        })}
      </ul>
    </section>
  );
}

const times = (count: number) => (count === 0 ? 'not yet' : count === 1 ? 'once' : `${count} times`);
