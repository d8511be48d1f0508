import { describe, expect, it } from 'vitest';
import { checkOrigin, originOfHost } from './origin.ts';

const LOCAL = { origin: 'http://127.0.0.1:4321', host: '127.0.0.1', port: 4321 };
const PUBLIC = { origin: 'https://gapmark.example', host: '0.0.0.0', port: 4321 };

describe('originOfHost()', () => {
  it('answers for the public host with or without its default port, in any case', () => {
    expect(originOfHost('gapmark.example', PUBLIC)).toBe('https://gapmark.example');
    expect(originOfHost('GAPMARK.example:443', PUBLIC)).toBe('https://gapmark.example');
  });

  it('answers for loopback names only when it listens on loopback, and only with its own port', () => {
    expect(originOfHost('[::1]:4321', LOCAL)).toBe('http://[::1]:4321');
    expect(originOfHost('localhost:4322', LOCAL)).toBeNull();
    expect(originOfHost('localhost:4321', PUBLIC)).toBeNull();
    expect(originOfHost('localhost:4321', { ...PUBLIC, host: '127.0.0.1' })).toBe('http://localhost:4321');
  });

  it.each([
    undefined,
    '',
    'gapmark.example.evil.example',
    'evil.example',
    'user@gapmark.example',
    'gapmark.example:80',
  ])('does not answer for %s', (host) => expect(originOfHost(host, PUBLIC)).toBeNull());
});

describe('checkOrigin()', () => {
  const check = (headers: Record<string, string>, method = 'POST') =>
    checkOrigin({
      method,
      header: (name) => headers[name],
      ownOrigin: PUBLIC.origin,
      cookieName: '__Host-gapmark',
    });
  const cookie = '__Host-gapmark=secret';

  it('lets what only reads pass, and a token, which no browser sends by itself', () => {
    expect(() => check({ cookie, origin: 'https://evil.example' }, 'GET')).not.toThrow();
    expect(() => check({ authorization: 'Bearer x', origin: 'https://evil.example' })).not.toThrow();
  });

  it('takes http for another origin than https', () => {
    expect(() => check({ cookie, origin: 'http://gapmark.example' })).toThrow('another site');
  });

  it('refuses a foreign browser without a cookie too, so that it cannot sign somebody in', () => {
    expect(() => check({ origin: 'https://evil.example' })).toThrow();
    expect(() => check({ 'sec-fetch-site': 'cross-site' })).toThrow();
    expect(() => check({ origin: 'null' })).toThrow();
  });

  it('lets a program without cookie and without a browser’s headers pass', () => {
    expect(() => check({})).not.toThrow();
    expect(() => check({ cookie: 'theme=dim' })).not.toThrow();
    expect(() => check({ cookie })).toThrow();
  });
});
