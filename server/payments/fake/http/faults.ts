/** Ways in which the service can misbehave on request; see the control endpoints. */
export interface Fault {
  /**
   * `lost-answer`: the work is done, then the line drops. `dropped`: the line drops before any work.
   * `error`: an error document instead of any work. `delay`: the work is done at once, its answer comes late.
   */
  kind: 'delay' | 'dropped' | 'error' | 'lost-answer';
  /** Part of the path it applies to, e.g. `/capture`; every path when absent. */
  path?: string;
  method?: 'GET' | 'POST';
  /** How many requests it hits; 1 when absent, `null` for all until cleared. */
  times?: number | null;
  /** Of `error`: 500 when absent. */
  status?: number;
  /** Of `delay`. */
  delayMs?: number;
}

export interface FaultBook {
  add(fault: Fault): void;
  clear(): void;
  list(): Fault[];
  /** The faults that hit this request, each used up by one. */
  take(method: string, path: string): Fault[];
}

export function createFaultBook(): FaultBook {
  let faults: (Fault & { left: number })[] = [];
  return {
    add: (fault) => void faults.push({ ...fault, left: fault.times === null ? Number.POSITIVE_INFINITY : (fault.times ?? 1) }),
    clear: () => {
      faults = [];
    },
    list: () => faults.map(({ left, ...fault }) => ({ ...fault, times: Number.isFinite(left) ? left : null })),
    take(method, path) {
      const seen = new Set<string>();
      const hits = faults.filter((fault) => {
        const matches = (fault.method ?? method) === method && path.includes(fault.path ?? '') && !seen.has(fault.kind);
        if (matches) seen.add(fault.kind);
        return matches;
      });
      for (const hit of hits) hit.left -= 1;
      faults = faults.filter((fault) => fault.left > 0);
      return hits;
    },
  };
}
