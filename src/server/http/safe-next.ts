const HERE = 'http://here.invalid';

/** A path of our own to go to after signing in; anything that a browser might read as another site becomes the fallback. */
export function safeNext(next: string | null | undefined, fallback = '/captures'): string {
  if (!next?.startsWith('/') || /[\\\p{Cc}]/u.test(next)) return fallback;
  try {
    const url = new URL(next, HERE);
    // Once its dots are resolved, a path may begin with the two slashes that name a host.
    const ours = url.origin === HERE && !url.pathname.startsWith('//');
    return ours ? url.pathname + url.search + url.hash : fallback;
  } catch {
    return fallback;
  }
}
