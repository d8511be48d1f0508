// @ts-check

/** Castagnoli's polynomial, reflected. Source: RFC 9260, appendix A. */
const TABLE = Uint32Array.from({ length: 256 }, (_, byte) => {
  let value = byte;
  for (let bit = 0; bit < 8; bit++) value = value & 1 ? (value >>> 1) ^ 0x82f63b78 : value >>> 1;
  return value >>> 0;
});

/**
 * CRC-32C of these bytes, continued from `before`; 0 for no bytes.
 * @param {Uint8Array} bytes @param {number} before
 */
export function crc32c(bytes, before = 0) {
  let value = ~before >>> 0;
  for (const byte of bytes) value = (value >>> 8) ^ (TABLE[(value ^ byte) & 0xff] ?? 0);
  return ~value >>> 0;
}
