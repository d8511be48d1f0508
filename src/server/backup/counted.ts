import { createHash } from 'node:crypto';
import { type Readable, Transform } from 'node:stream';

export interface Counted {
  readonly stream: Readable;
  /** Of what has passed; the whole once the stream has ended. */
  readonly seen: () => { sha256: string; bytes: number };
}

/** Passes a stream on and takes its length and SHA-256 on the way. A fault of the source becomes one of the result. */
export function counted(source: Readable): Counted {
  const hash = createHash('sha256');
  let bytes = 0;
  let digest: string | undefined;
  const stream = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      bytes += chunk.byteLength;
      hash.update(chunk);
      done(null, chunk);
    },
    flush(done) {
      digest = hash.digest('hex');
      done();
    },
  });
  source.on('error', (error) => stream.destroy(error));
  source.pipe(stream);
  return { stream, seen: () => ({ sha256: digest ?? '', bytes }) };
}
