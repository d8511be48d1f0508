import { expect, it } from 'vitest';
import { LockSession } from '../../src/server/queue/lock-session.ts';

it('LockSession.open() makes one connection, however many ask for it at the same time or again', async () => {
  let connections = 0;
  const session = new LockSession([], async () => {
    connections += 1;
  });
  try {
    await Promise.all([session.open(), session.open(), session.open()]);
    await session.open();
    expect(connections).toBe(1);
    expect(await session.query('select 1 as one')).toEqual([{ one: 1 }]);
  } finally {
    await session.close();
  }
});
