import { createHash } from 'node:crypto';
import { RateLimiterMemory, RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import type { Caller } from '../access.ts';
import { connectionPool } from '../db/client.ts';
import { ApiError } from '../errors.ts';
import { addressGroup } from './address.ts';

const DAY_S = 86_400;

/** Counted in PostgreSQL, so that all web processes count together. */
const shared = (keyPrefix: string, points: number, duration: number, sweeps = false) =>
  new RateLimiterPostgres({
    storeClient: connectionPool(),
    storeType: 'pool',
    tableName: 'rate_limit',
    tableCreated: true,
    clearExpiredByTimeout: sweeps,
    keyPrefix,
    points,
    duration,
  });

const once = <T>(make: () => T) => {
  let made: T | undefined;
  return () => {
    made ??= make();
    return made;
  };
};

/** Keys are hashed: the table holds no e-mail addresses. */
const keyOf = (text: string) => createHash('sha256').update(text).digest('hex').slice(0, 40);

/** Takes one point or says 429. Other faults (the database away) go up. */
async function take(limiter: RateLimiterPostgres | RateLimiterMemory, key: string, durationS?: number) {
  try {
    return await limiter.consume(key, 1, durationS === undefined ? {} : { customDuration: durationS });
  } catch (thrown) {
    if (thrown instanceof RateLimiterRes) throw tooMany(thrown.msBeforeNext);
    throw thrown;
  }
}

const tooMany = (ms: number) => new ApiError('too_many', { retryAfterS: Math.max(1, Math.ceil(ms / 1000)) });

interface Backoff {
  /** Counts tries since the last success. */
  readonly tries: () => RateLimiterPostgres;
  /** Open once a delay. */
  readonly gate: () => RateLimiterPostgres;
  readonly free: number;
  readonly longestS: number;
}

/** Much higher than any count that occurs: the counters count, the gates refuse. */
const UNCOUNTED = 1_000_000;

const ACCOUNT: Backoff = {
  tries: once(() => shared('signin-account', UNCOUNTED, DAY_S, true)),
  gate: once(() => shared('signin-account-gate', 1, 1)),
  free: 5,
  longestS: 300,
};

/** Higher, as a whole workshop may share an address. */
const ADDRESS: Backoff = {
  tries: once(() => shared('signin-address', UNCOUNTED, DAY_S)),
  gate: once(() => shared('signin-address-gate', 1, 1)),
  free: 30,
  longestS: 900,
};

/** Seconds between tries once the free ones are used: 2, 4, 8 … up to the longest. Never a lasting lock. */
export const delayS = (tries: number, free: number, longestS: number): number =>
  tries <= free ? 0 : Math.min(longestS, 2 ** Math.min(30, tries - free));

/**
 * Counts the try before the password is looked at, so that many at once do not all pass. A refused try is not counted, so the
 * delay does not grow by knocking.
 */
async function tryOnce(backoff: Backoff, key: string): Promise<void> {
  const { consumedPoints } = await take(backoff.tries(), key);
  const wait = delayS(consumedPoints, backoff.free, backoff.longestS);
  if (wait === 0) return;
  try {
    await take(backoff.gate(), key, wait);
  } catch (refusal) {
    await backoff.tries().reward(key, 1);
    throw refusal;
  }
}

/** Before a sign-in: per account and per address, with growing delay. */
export async function limitSignIn(email: string, address: string): Promise<void> {
  const ofAddress = keyOf(addressGroup(address));
  await tryOnce(ADDRESS, ofAddress);
  try {
    await tryOnce(ACCOUNT, keyOf(email));
  } catch (refusal) {
    await ADDRESS.tries().reward(ofAddress, 1);
    throw refusal;
  }
}

/**
 * After a right password the account's tries are forgotten. Of the address's only this one is: they count what failed, and
 * signing in to one's own account must not buy new tries at others.
 */
export async function forgetSignInTries(email: string, address: string): Promise<void> {
  await Promise.all([
    ACCOUNT.tries().delete(keyOf(email)),
    ACCOUNT.gate().delete(keyOf(email)),
    ADDRESS.tries().reward(keyOf(addressGroup(address)), 1),
  ]);
}

const signUps = once(() => shared('signup', 20, 3600));
/** Twenty workshops an hour from one address. */
export const limitSignUp = async (address: string): Promise<void> => {
  await take(signUps(), keyOf(addressGroup(address)));
};

const mailsToAccount = once(() => shared('mail-account', 3, 3600));
const mailsFromAddress = once(() => shared('mail-address', 20, 3600));
const invitations = once(() => shared('invitations', 60, 3600));

/** Mails that anybody can ask for, such as a reset: twenty an hour from an address. */
export const limitMailAsked = async (address: string): Promise<void> => {
  await take(mailsFromAddress(), keyOf(addressGroup(address)));
};

/** Whether another such mail may go to this account: three an hour. Told to nobody, as it would tell who has an account. */
export async function mayMailAccount(account: string): Promise<boolean> {
  try {
    await take(mailsToAccount(), keyOf(account));
    return true;
  } catch (thrown) {
    if (thrown instanceof ApiError) return false;
    throw thrown;
  }
}

/** Sixty invitations an hour from one workshop. */
export const limitInvitations = async (workshopId: string): Promise<void> => {
  await take(invitations(), keyOf(workshopId));
};

const questions = once(() => shared('questions', 30, 3600));
/** Thirty questions by mail an hour from one person. */
export const limitQuestions = async (personId: string): Promise<void> => {
  await take(questions(), keyOf(personId));
};

const answersOfAddress = once(() => shared('answer-address', 10, 600));
const answersOfLink = once(() => shared('answer-link', 60, 3600));
const looks = once(() => shared('seen', 6, 60));

/** Answers through a link: ten in ten minutes from an address on one link, sixty an hour on the link. */
export async function limitAnswers(linkId: string, address: string): Promise<void> {
  await take(answersOfAddress(), keyOf(`${linkId} ${addressGroup(address)}`));
  await take(answersOfLink(), keyOf(linkId));
}

/** Whether another look from this address is counted. */
export async function countsLook(linkId: string, address: string): Promise<boolean> {
  try {
    await take(looks(), keyOf(`${linkId} ${addressGroup(address)}`));
    return true;
  } catch (thrown) {
    if (thrown instanceof ApiError) return false;
    throw thrown;
  }
}

/**
 * The API's general rate: 2,000 requests in ten seconds a token, session or link, 600 for a caller who is nobody. In memory: it
 * protects each process, must not cost a query a request, and a token's 50 a second hold with any number of processes.
 */
const byCaller = once(() => new RateLimiterMemory({ keyPrefix: 'api', points: 2_000, duration: 10 }));
const byAddress = once(() => new RateLimiterMemory({ keyPrefix: 'open', points: 600, duration: 10 }));

export async function limitApi(caller: Caller, address: string): Promise<void> {
  if (caller.kind === 'person') await take(byCaller(), caller.tokenId ?? caller.sessionId ?? caller.personId);
  else if (caller.kind === 'share') await take(byCaller(), `${caller.linkId} ${addressGroup(address)}`);
  else await take(byAddress(), addressGroup(address));
}
