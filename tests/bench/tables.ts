/** Prints a table with its columns aligned, numbers already formatted. */
export function printTable(
  title: string,
  head: readonly string[],
  rows: readonly string[][],
): void {
  const widths = head.map((name, k) => Math.max(name.length, ...rows.map((row) => row[k]!.length)));
  const line = (cells: readonly string[]) =>
    `  ${cells.map((cell, k) => (k === 0 ? cell.padEnd(widths[k]!) : cell.padStart(widths[k]!))).join('  ')}`;
  console.log(`\n${title}`);
  console.log(line(head));
  for (const row of rows) console.log(line(row));
}

/** The value below which a share of the times lies. */
export function quantile(times: readonly number[], share: number): number {
  const sorted = [...times].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? NaN;
}

/** Milliseconds that a piece of work takes. */
export function timed(work: () => unknown): number {
  const started = performance.now();
  work();
  return performance.now() - started;
}
