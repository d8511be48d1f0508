// @ts-check
import { setTimeout as sleep } from 'node:timers/promises';

/**
 * One of each thing in the demo workshop, by name, as the pages' addresses need them. What the demo does not have is made
 * where it can be (a share link, a comparison), else named and left out.
 * @param {string} origin @param {string} token @param {import('./say.mjs').Say} say
 * @returns {Promise<Record<string, string>>}
 */
export async function demoThings(origin, token, say) {
  /** @param {string} path @param {unknown} [body] @returns {Promise<any>} */
  const ask = async (path, body) => {
    const answer = await fetch(`${origin}/api/v1${path}`, {
      method: body === undefined ? 'GET' : 'POST',
      headers: {
        authorization: `Bearer ${token}`,
        ...(body === undefined ? {} : { 'content-type': 'application/json' }),
      },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    const json = await answer.json();
    if (answer.ok) return json;
    say(`! ${path} answered ${answer.status}: ${json?.error?.message ?? ''}`);
    return null;
  };
  const captures = await ask('/captures?limit=50');
  const ready = (captures?.items ?? []).filter((/** @type {any} */ item) => item.status === 'ready');
  const capture = (ready.find((/** @type {any} */ item) => /crank/i.test(item.title)) ?? ready[0])?.id ?? '';
  const knownGood = (await ask('/known-goods?limit=1'))?.items?.[0]?.id ?? '';
  const link =
    capture &&
    (await ask(`/captures/${capture}/share-links`, { question: 'Is this gap right?', mayAnswer: true }));
  const share = link ? (new URL(link.url).pathname.split('/').pop() ?? '') : '';
  const comparison = knownGood ? await compare(ask, ready, knownGood) : '';
  const set = (await ask('/sets?limit=1'))?.items?.[0]?.id ?? '';
  const exercise = (await ask('/exercises?limit=1'))?.items?.[0]?.id ?? '';
  const things = { capture, knownGood, share, comparison, set, exercise };
  for (const [name, id] of Object.entries(things))
    if (!id) say(`! The demo has no ${name}: its pages are left out`);
  return things;
}

/**
 * The first signal that the known-good can be compared with, compared.
 * @param {(path: string, body?: unknown) => Promise<any>} ask @param {any[]} captures @param {string} knownGoodId
 * @returns {Promise<string>} empty: none
 */
async function compare(ask, captures, knownGoodId) {
  const { signals } = (await ask(`/known-goods/${knownGoodId}`)) ?? {};
  const circuits = (signals ?? []).map((/** @type {any} */ signal) => signal.circuit);
  for (const capture of captures) {
    const signal = capture.signals?.find((/** @type {any} */ one) => circuits.includes(one.circuit))?.index;
    if (signal === undefined) continue;
    const made = await ask(`/captures/${capture.id}/comparisons`, { signal, knownGoodId });
    for (let tries = 0; made && tries < 60; tries++) {
      const { status } = (await ask(`/comparisons/${made.id}`)) ?? {};
      if (status !== 'queued' && status !== 'running') return made.id;
      await sleep(500);
    }
  }
  return '';
}

/** @param {string} path @param {Record<string, string>} things @returns {string | null} null: a thing is missing */
export function fillPath(path, things) {
  let missing = false;
  const filled = path.replace(/\{(\w+)\}/g, (_, name) => {
    if (!things[name]) missing = true;
    return things[name] ?? '';
  });
  return missing ? null : filled;
}
