/**
 * Watches a folder and uploads every CSV file that appears in it: an example of using the API from a bench computer.
 *
 *   GAPMARK_TOKEN=… node watch-folder.mjs FOLDER https://gapmark.example
 *
 * The token needs the scope "write" (Workshop, Tokens). Needs Node 20 and nothing else. What was uploaded is remembered in
 * FOLDER/.uploaded.json by its content, so a file is sent once, whatever happens in between; nothing in the folder is changed.
 */
import { createHash } from 'node:crypto';
import { createReadStream, existsSync, openAsBlob, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { readdir, stat } from 'node:fs/promises';
import { basename, join } from 'node:path';
import { Readable } from 'node:stream';
import { setTimeout as sleep } from 'node:timers/promises';

const [folder = '', server = ''] = process.argv.slice(2);
const token = process.env.GAPMARK_TOKEN ?? '';
if (folder === '' || server === '' || token === '') {
  console.error('GAPMARK_TOKEN=… node watch-folder.mjs FOLDER https://gapmark.example');
  process.exit(2);
}

const LOOK_MS = 2_000;
const FORM_LIMIT = 32 * 1024 * 1024;
const headers = { authorization: `Bearer ${token}` };
const memory = join(folder, '.uploaded.json');
/** SHA-256 of the content → the capture's id. @type {Record<string, string>} */
const uploaded = existsSync(memory) ? JSON.parse(readFileSync(memory, 'utf8')) : {};
/** Sizes of the last look: a file that still grows is left until it stands still. @type {Map<string, number>} */
const sizes = new Map();

/** @param {string} path */
async function sha256(path) {
  const hash = createHash('sha256');
  for await (const chunk of createReadStream(path)) hash.update(chunk);
  return hash.digest('hex');
}

/** Refused for good: trying again would change nothing. */
class Refused extends Error {}

/** @param {Response} answer @param {string} what */
async function checked(answer, what) {
  if (answer.ok) return answer;
  const text = await answer.text();
  if (answer.status === 429 || answer.status >= 500) throw new Error(`${what}: ${answer.status}`);
  let words = text.slice(0, 200);
  try {
    words = JSON.parse(text).error.message;
  } catch {
    // not our server's answer; shown as it came
  }
  throw new Refused(`${what}: ${words}`);
}

/** Up to 32 MiB in one form. The key makes a repeat harmless. @param {string} path @param {string} key */
async function sendForm(path, key) {
  const form = new FormData();
  form.append('file', await openAsBlob(path), basename(path));
  const answer = await fetch(new URL('/api/v1/captures', server), {
    method: 'POST',
    headers: { ...headers, 'idempotency-key': key },
    body: form,
  });
  return String((await (await checked(answer, 'upload')).json()).id);
}

/** Larger ones by tus 1.0, going on from the byte that arrived. @param {string} path @param {number} size */
async function sendResumable(path, size) {
  const tus = { ...headers, 'tus-resumable': '1.0.0' };
  const name = Buffer.from(basename(path)).toString('base64');
  const created = await fetch(new URL('/api/v1/uploads', server), {
    method: 'POST',
    headers: { ...tus, 'upload-length': String(size), 'upload-metadata': `filename ${name}` },
  });
  const location = (await checked(created, 'upload')).headers.get('location') ?? '';
  const upload = new URL(location, server);
  for (let tries = 0; ; tries += 1) {
    try {
      const head = await checked(await fetch(upload, { method: 'HEAD', headers: tus }), 'upload');
      const done = head.headers.get('gapmark-capture');
      if (done !== null) return done;
      const offset = Number(head.headers.get('upload-offset'));
      const body = Readable.toWeb(createReadStream(path, { start: offset }));
      const sent = await fetch(upload, {
        method: 'PATCH',
        headers: {
          ...tus,
          'upload-offset': String(offset),
          'content-type': 'application/offset+octet-stream',
        },
        duplex: 'half',
        body,
      });
      const id = (await checked(sent, 'upload')).headers.get('gapmark-capture');
      if (id !== null) return id;
    } catch (error) {
      if (error instanceof Refused || tries >= 20) throw error;
      await sleep(Math.min(60_000, 1_000 * 2 ** tries));
    }
  }
}

/** @param {string} sum @param {string} id */
function remember(sum, id) {
  uploaded[sum] = id;
  writeFileSync(`${memory}.new`, JSON.stringify(uploaded, null, 1));
  renameSync(`${memory}.new`, memory);
}

/** @param {string} path @param {number} size */
async function upload(path, size) {
  const sum = await sha256(path);
  if (Object.hasOwn(uploaded, sum)) return;
  try {
    const id = size <= FORM_LIMIT ? await sendForm(path, sum) : await sendResumable(path, size);
    remember(sum, id);
    console.log(`${basename(path)}: ${new URL(`/captures/${id}`, server)}`);
  } catch (error) {
    const words = error instanceof Error ? error.message : String(error);
    if (error instanceof Refused) {
      remember(sum, 'refused');
      console.error(`${basename(path)} was refused. ${words}`);
    } else {
      console.error(`${basename(path)} could not be sent (${words}); it is tried again.`);
      sizes.delete(path);
    }
  }
}

for (;;) {
  for (const name of (await readdir(folder)).filter((each) => /\.(csv|txt)$/i.test(each)).sort()) {
    const path = join(folder, name);
    const size = await stat(path).then(
      (found) => (found.isFile() ? found.size : null),
      () => null,
    );
    if (size === null || size === 0) continue;
    const before = sizes.get(path);
    sizes.set(path, size);
    // Seen twice with one size: whole. A third look at it costs nothing but this comparison.
    if (before === size) {
      sizes.set(path, -size);
      await upload(path, size);
    } else if (before === -size) sizes.set(path, -size);
  }
  await sleep(LOOK_MS);
}
