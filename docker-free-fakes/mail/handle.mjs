// @ts-check
import { listPage, MESSAGE_POLICY, messagePage, PAGE_POLICY } from './pages.mjs';

/**
 * `/` lists, `/messages/<id>` shows, `/messages/<id>/html` is what the frame holds, `/messages.json` is for programs.
 * @param {ReturnType<typeof import('./mailbox.mjs').openMailbox>} mailbox
 * @returns {import('node:http').RequestListener}
 */
export function makePages(mailbox) {
  /** @param {string} path */
  const answer = async (path) => {
    if (path === '/') return { type: 'text/html', policy: PAGE_POLICY, body: listPage(await mailbox.list()) };
    if (path === '/messages.json')
      return { type: 'application/json', policy: PAGE_POLICY, body: JSON.stringify(await mailbox.list()) };
    const [, id = '', html] = /^\/messages\/([0-9a-z-]+)(\/html)?$/.exec(path) ?? [];
    const mail = id === '' ? null : await mailbox.read(id);
    if (!mail) return null;
    if (html === undefined) return { type: 'text/html', policy: PAGE_POLICY, body: messagePage(mail) };
    return { type: 'text/html', policy: MESSAGE_POLICY, body: mail.html ?? '' };
  };

  return async (request, response) => {
    // Mail holds sign-in links: a page elsewhere must not reach it through a name that points here.
    if (!/^(127\.0\.0\.1|localhost)(:\d+)?$/.test(request.headers.host ?? '')) {
      response.writeHead(421, { 'content-type': 'text/plain' }).end('Ask 127.0.0.1 or localhost.\n');
      return;
    }
    const found = await answer((request.url ?? '/').split('?')[0] ?? '/').catch((error) => {
      process.stderr.write(`${String(error)}\n`);
      return null;
    });
    if (!found || request.method !== 'GET') {
      response
        .writeHead(found ? 405 : 404, { 'content-type': 'text/plain' })
        .end('There is no such message.\n');
      return;
    }
    response.writeHead(200, {
      'content-type': `${found.type}; charset=utf-8`,
      'content-security-policy': found.policy,
      'x-content-type-options': 'nosniff',
      'referrer-policy': 'no-referrer',
      'cache-control': 'no-store',
    });
    response.end(found.body);
  };
}
