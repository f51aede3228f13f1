/** Timing and printing for the benchmarks. */

/** Median wall time of some runs after two to warm up, with the last result. */
export function median<T>(runs: number, work: () => T): { ms: number; value: T } {
  work();
  let value = work();
  const times: number[] = [];
  for (let i = 0; i < runs; i++) {
    const start = performance.now();
    value = work();
    times.push(performance.now() - start);
  }
  return { ms: middle(times), value };
}

export function middle(times: number[]): number {
  return [...times].sort((a, b) => a - b)[times.length >> 1];
}

const figure = (value: number | string): string =>
  typeof value === 'string' ? value : String(Number(value.toPrecision(3)));

export function print(
  name: string,
  value: number,
  unit: string,
  more: Record<string, number | string> = {},
): void {
  const rest = Object.entries(more).map(([key, item]) => `${key} ${figure(item)}`);
  process.stdout.write(
    `${name}: ${figure(value)} ${unit}${rest.length > 0 ? ` (${rest.join(', ')})` : ''}\n`,
  );
}
