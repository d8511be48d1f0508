// @ts-check
import { createHash, randomBytes } from 'node:crypto';
import { mkdirSync, readdirSync } from 'node:fs';
import { readFile, rename, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { simpleParser } from 'mailparser';

/**
 * Caught mail, a file each: `<time>-<random>.eml`, so the names' order is the order of arrival.
 *
 * @typedef {{ id: string, received: string, from: string, to: string[], subject: string, text: string, html: string | null }} Mail
 */

const MOST_KEPT = 500;

/** @param {string} folder */
export function openMailbox(folder) {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  /** @type {Map<string, Mail>} */
  const parsed = new Map();

  const names = () =>
    readdirSync(folder)
      .filter((name) => name.endsWith('.eml'))
      .sort()
      .reverse();

  /** @param {string} id @returns {Promise<Mail | null>} */
  const read = async (id) => {
    const known = parsed.get(id);
    if (known) return known;
    if (!/^[0-9a-z-]+$/.test(id)) return null;
    const source = await readFile(join(folder, `${id}.eml`)).catch(() => null);
    if (!source) return null;
    const mail = await simpleParser(source);
    const to = Array.isArray(mail.to) ? mail.to : mail.to ? [mail.to] : [];
    /** @type {Mail} */
    const found = {
      id,
      received: new Date(Number(id.split('-')[0])).toISOString(),
      from: mail.from?.text ?? '',
      to: to.flatMap((list) => list.value.map((address) => address.address ?? '')),
      subject: mail.subject ?? '',
      text: mail.text ?? '',
      html: mail.html || null,
    };
    parsed.set(id, found);
    return found;
  };

  return {
    read,

    /** The whole message or nothing. @param {Buffer} source */
    add: async (source) => {
      const id = `${String(Date.now()).padStart(14, '0')}-${randomBytes(6).toString('hex')}`;
      const half = join(folder, `${id}.half`);
      await writeFile(half, source, { mode: 0o600 });
      await rename(half, join(folder, `${id}.eml`));
      for (const old of names().slice(MOST_KEPT)) {
        parsed.delete(old.replace(/\.eml$/, ''));
        await rm(join(folder, old), { force: true });
      }
      return id;
    },

    /** Newest first. @returns {Promise<Mail[]>} */
    list: async () => {
      const mails = await Promise.all(names().map((name) => read(name.replace(/\.eml$/, ''))));
      return mails.filter((mail) => mail !== null);
    },
  };
}

/** The style sheet's hash for the page's own policy. @param {string} text */
export function styleHash(text) {
  return `'sha256-${createHash('sha256').update(text).digest('base64')}'`;
}
