/** Timers and work under way, which can be waited for or forgotten together. */
export class Rounds {
  private readonly timers = new Set<NodeJS.Timeout>();
  private waiting: (() => void)[] = [];
  private underWay = 0;
  private generation = 0;

  later(ms: number, work: () => void): void {
    const timer = setTimeout(() => {
      this.timers.delete(timer);
      work();
    }, ms);
    this.timers.add(timer);
  }

  /** Marks something as under way; calling the answer ends it. What was forgotten meanwhile no longer counts. */
  begin(): () => void {
    const mine = this.generation;
    this.underWay += 1;
    return () => {
      if (mine !== this.generation) return;
      this.underWay -= 1;
      if (this.underWay === 0) this.wake();
    };
  }

  /** Resolves when nothing is under way; timers alone do not count. */
  async idle(): Promise<void> {
    // One turn, so that what was set off just now is counted.
    await new Promise((resolve) => setImmediate(resolve));
    if (this.underWay > 0) await new Promise<void>((resolve) => this.waiting.push(resolve));
  }

  forget(): void {
    for (const timer of this.timers) clearTimeout(timer);
    this.timers.clear();
    this.generation += 1;
    this.underWay = 0;
    this.wake();
  }

  private wake(): void {
    for (const resolve of this.waiting) resolve();
    this.waiting = [];
  }
}
