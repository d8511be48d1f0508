const KINDS: readonly { readonly start: readonly number[]; readonly kind: string; readonly hint: string }[] =
  [
    { start: [0x89, 0x50, 0x4e, 0x47], kind: 'a PNG picture', hint: '' },
    { start: [0xff, 0xd8, 0xff], kind: 'a JPEG picture', hint: '' },
    { start: [0x47, 0x49, 0x46, 0x38], kind: 'a GIF picture', hint: '' },
    { start: [0x42, 0x4d], kind: 'a BMP picture', hint: '' },
    { start: [0x25, 0x50, 0x44, 0x46], kind: 'a PDF document', hint: '' },
    { start: [0x1f, 0x8b], kind: 'a gzip archive', hint: 'Unpack it and upload the CSV file that is in it.' },
    {
      start: [0x50, 0x4b, 0x03, 0x04],
      kind: 'an archive or a spreadsheet workbook',
      hint: 'Unpack it, or save the sheet as CSV, and upload that file.',
    },
    {
      start: [0xd0, 0xcf, 0x11, 0xe0],
      kind: 'an old spreadsheet workbook',
      hint: 'Save the sheet as CSV and upload that file.',
    },
    { start: [0x52, 0x49, 0x46, 0x46], kind: 'a sound or video file', hint: '' },
  ];

const EXPORT = 'Export the capture from the scope as CSV text and upload that file.';

export interface NotText {
  readonly kind: string;
  readonly hint: string;
}

/**
 * What the file is when it is no text: known first bytes, else zero bytes or many control characters in the first
 * part. null: it may be text. UTF-16 must have been ruled out before, since it is full of zero bytes.
 */
export function notText(head: Uint8Array): NotText | null {
  for (const { start, kind, hint } of KINDS) {
    // Two letters alone ("BM") also begin ordinary text: such a file must hold zero bytes as well.
    const matches = start.every((byte, i) => head[i] === byte) && (start.length > 2 || head.indexOf(0) >= 0);
    if (matches) return { kind, hint: hint || EXPORT };
  }
  const length = Math.min(head.length, 65_536);
  let controls = 0;
  for (let i = 0; i < length; i++) {
    const byte = head[i]!;
    if (byte === 0) return { kind: 'a binary file', hint: EXPORT };
    if (byte < 32 && byte !== 9 && byte !== 10 && byte !== 13 && byte !== 12 && byte !== 26) controls++;
  }
  return controls > 0.05 * length ? { kind: 'a binary file', hint: EXPORT } : null;
}
