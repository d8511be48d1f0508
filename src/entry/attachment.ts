/** Content-Disposition for saving under a name that a user gave (RFC 6266: a plain form, and the exact one in UTF-8). */
export function attachment(fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]/g, '_').replace(/["\\%]/g, '_');
  const exact = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${exact}`;
}
