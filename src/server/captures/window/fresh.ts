/**
 * Joins look-ups of the same thing that are asked for at the same time. Each answer comes from a look-up that began after it
 * was asked for, so nobody is told what was true before: callers join the next look-up, never one that already runs.
 */
export class Fresh<T> {
  private readonly entries = new Map<string, { running: Promise<T>; next: Promise<T> | undefined }>();

  get(key: string, look: () => Promise<T>): Promise<T> {
    const entry = this.entries.get(key);
    if (entry === undefined) return this.start(key, look);
    entry.next ??= entry.running.then(
      () => this.start(key, look),
      () => this.start(key, look),
    );
    return entry.next;
  }

  private start(key: string, look: () => Promise<T>): Promise<T> {
    const running = look();
    const entry = { running, next: undefined };
    this.entries.set(key, entry);
    const end = () => {
      if (this.entries.get(key) === entry && entry.next === undefined) this.entries.delete(key);
    };
    running.then(end, end);
    return running;
  }
}
