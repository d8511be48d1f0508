/**
 * A user's text as a CSV cell. What a spreadsheet would take for a formula gets a leading apostrophe, which our reader takes
 * off again (OWASP, "CSV Injection"); separators and quotes are quoted (RFC 4180).
 */
export function textCell(text: string): string {
  const guarded = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(guarded) ? `"${guarded.replace(/"/g, '""')}"` : guarded;
}
