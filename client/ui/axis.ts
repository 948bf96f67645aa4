/** Round steps (1, 2, 5 times a power of ten) that divide a span into about so many parts. */
export function niceStep(span: number, parts: number): number {
  const rough = span / Math.max(1, parts);
  const power = 10 ** Math.floor(Math.log10(rough));
  const lead = rough / power;
  const round = lead <= 1 ? 1 : lead <= 2 ? 2 : lead <= 5 ? 5 : 10;
  return round * power;
}

/** Multiples of a round step inside [from, to]. */
export function niceTicks(from: number, to: number, parts: number): number[] {
  if (!(to > from)) return [from];
  const step = niceStep(to - from, parts);
  const ticks: number[] = [];
  for (let tick = Math.ceil(from / step); tick * step <= to * (1 + 1e-9); tick += 1) {
    ticks.push(Number((tick * step).toPrecision(12)));
  }
  return ticks;
}
