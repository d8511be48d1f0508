import { hash, verify } from '@node-rs/argon2';
import { ApiError } from '../errors.ts';
import { newSecret } from '../ids.ts';

/**
 * argon2id (the package's default), 19 MiB, two passes, one lane: the first choice of OWASP's password storage sheet; RFC 9106
 * describes the function.
 */
const PARAMETERS = { memoryCost: 19 * 1024, timeCost: 2, parallelism: 1 } as const;

const AT_A_TIME = 2;
const LONGEST_QUEUE = 100;
let running = 0;
const waiting: (() => void)[] = [];

/** Runs at most two at a time, in order of arrival: memory and cores stay free for everybody else. */
export async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (running >= AT_A_TIME) {
    if (waiting.length >= LONGEST_QUEUE) throw new ApiError('too_many', { retryAfterS: 5 });
    await new Promise<void>((resolve) => waiting.push(resolve));
  } else running += 1;
  try {
    return await work();
  } finally {
    // The place is handed on; it is free only when nobody waits.
    const next = waiting.shift();
    if (next === undefined) running -= 1;
    else next();
  }
}

export const hashPassword = (password: string): Promise<string> => inTurn(() => hash(password, PARAMETERS));

let decoy: Promise<string> | undefined;

/** Verifies a password; for an unknown account (no hash) the same work is done against a hash of nobody's password. */
export async function verifyPassword(passwordHash: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword(newSecret());
  // An erased account keeps no hash; what is none is never right.
  const kept = passwordHash?.startsWith('$argon2') ? passwordHash : null;
  const against = kept ?? (await decoy);
  const right = await inTurn(() => verify(against, password));
  return right && kept !== null;
}
