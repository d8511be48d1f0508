import { endianness } from 'node:os';

/** The files are little-endian and so is every machine that Node supports for servers; refuse to write the wrong order. */
if (endianness() !== 'LE') throw new Error('Samples are stored little-endian; this machine is big-endian.');

export const bytesOf = (array: Float32Array | Float64Array): Uint8Array =>
  new Uint8Array(array.buffer, array.byteOffset, array.byteLength);

/** Bytes as float32; copied only where they are not aligned. */
export function asFloat32(bytes: Uint8Array): Float32Array {
  const aligned = bytes.byteOffset % 4 === 0 ? bytes : bytes.slice();
  return new Float32Array(aligned.buffer, aligned.byteOffset, aligned.byteLength >> 2);
}

/** Bytes as float64; copied only where they are not aligned. */
export function asFloat64(bytes: Uint8Array): Float64Array {
  const aligned = bytes.byteOffset % 8 === 0 ? bytes : bytes.slice();
  return new Float64Array(aligned.buffer, aligned.byteOffset, aligned.byteLength >> 3);
}
