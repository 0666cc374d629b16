/** A seeded source of random numbers (mulberry32), so that an evaluation can be run again to the same digits. */
export class Random {
  private state: number;

  constructor(seed: number) {
    this.state = seed >>> 0;
  }

  /** Even on [0, 1). */
  unit(): number {
    this.state = (this.state + 0x6d2b79f5) >>> 0;
    let t = this.state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.unit();
  }

  chance(p: number): boolean {
    return this.unit() < p;
  }

  pick<T>(list: readonly T[]): T {
    const entry = list[Math.floor(this.unit() * list.length)];
    if (entry === undefined) throw new RangeError('cannot pick from an empty list');
    return entry;
  }

  weighted<T>(list: readonly T[], weight: (entry: T) => number): T {
    let rest = this.unit() * list.reduce((sum, entry) => sum + weight(entry), 0);
    for (const entry of list) {
      rest -= weight(entry);
      if (rest < 0) return entry;
    }
    return this.pick(list);
  }

  /** Standard normal (Box–Muller). */
  normal(): number {
    return Math.sqrt(-2 * Math.log(1 - this.unit())) * Math.cos(2 * Math.PI * this.unit());
  }

  /** Student's t with `freedom` degrees, scaled to unit variance: a bell with heavier tails than the engine's. */
  heavyTailed(freedom: number): number {
    let chiSquare = 0;
    for (let i = 0; i < freedom; i += 1) chiSquare += this.normal() ** 2;
    return (this.normal() / Math.sqrt(chiSquare / freedom)) * Math.sqrt((freedom - 2) / freedom);
  }
}
