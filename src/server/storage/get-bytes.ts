import { fromStore } from './away.ts';
import { getObject } from './get-object.ts';

/**
 * An object's bytes, or those of a range of it, in one buffer of its own, so that typed arrays can lie over it.
 */
export async function getBytes(
  key: string,
  range?: { readonly from: number; readonly to: number },
): Promise<Uint8Array<ArrayBuffer>> {
  const { body, length } = await getObject(key, range);
  const bytes = new Uint8Array(length);
  let at = 0;
  await fromStore(async () => {
    for await (const chunk of body as AsyncIterable<Uint8Array>) {
      bytes.set(chunk, at);
      at += chunk.length;
    }
  });
  if (at !== length) throw new Error(`The store gave ${at} of ${length} bytes of ${key}`);
  return bytes;
}
