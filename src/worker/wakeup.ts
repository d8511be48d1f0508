/** Lets several loops sleep until something happens or their time is up. */
export class Wakeup {
  private readonly waiters = new Set<() => void>();

  wake(): void {
    for (const waiter of [...this.waiters]) waiter();
  }

  wait(ms: number): Promise<void> {
    return new Promise((resolve) => {
      const end = () => {
        clearTimeout(timer);
        this.waiters.delete(end);
        resolve();
      };
      const timer = setTimeout(end, ms);
      this.waiters.add(end);
    });
  }
}
