export type Timed = { what: string; number: number; median: number; low: number; high: number };

/** Runs `work` in rounds after one to warm up; seconds for one of its `number` things. */
export function time(what: string, number: number, work: () => void, rounds = 7): Timed {
  work();
  const each = Array.from({ length: rounds }, () => {
    const began = performance.now();
    work();
    return (performance.now() - began) / 1000 / number;
  }).sort((a, b) => a - b);
  return { what, number, median: each[rounds >> 1]!, low: each[0]!, high: each[rounds - 1]! };
}
