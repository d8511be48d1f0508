/** "14 May 2026, 09:42" in the workshop's zone. */
export function whenText(at: Date, timeZone: string): string {
  const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone });
  const time = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', timeZone });
  return `${day.format(at)}, ${time.format(at)}`;
}
