/** Keeps what was used last, up to a number of bytes. */
export class BoundedCache<T> {
  private readonly entries = new Map<string, { readonly value: T; readonly bytes: number }>();
  private held = 0;
  private readonly limitBytes: number;

  constructor(limitBytes: number) {
    this.limitBytes = limitBytes;
  }

  get(key: string): T | undefined {
    const entry = this.entries.get(key);
    if (entry === undefined) return undefined;
    this.entries.delete(key);
    this.entries.set(key, entry);
    return entry.value;
  }

  set(key: string, value: T, bytes: number): void {
    const earlier = this.entries.get(key);
    if (earlier !== undefined) this.held -= earlier.bytes;
    this.entries.delete(key);
    if (bytes > this.limitBytes) return;
    this.entries.set(key, { value, bytes });
    this.held += bytes;
    for (const [oldest, entry] of this.entries) {
      if (this.held <= this.limitBytes) break;
      this.entries.delete(oldest);
      this.held -= entry.bytes;
    }
  }
}
