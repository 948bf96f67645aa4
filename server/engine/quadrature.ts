interface WeightedNode {
  node: number;
  weight: number;
}

const points = 12;
const rule = gaussLegendreRule(points);
const relativeTolerance = 1e-13;
/** Bounds the work where rounding noise, not shape, keeps two estimates apart. */
const mostHalvings = 160;
const mostSteps = 60;

/**
 * Nodes and weights of the Gauss–Legendre rule on −1…1, ascending, exact for polynomials up to
 * degree 2n − 1. The nodes are the roots of the Legendre polynomial, found by Newton's method.
 */
export function gaussLegendreRule(count: number): readonly WeightedNode[] {
  const nodes: WeightedNode[] = [];
  for (let k = count; k >= 1; k--) {
    let x = Math.cos((Math.PI * (k - 0.25)) / (count + 0.5));
    let slope = 1;
    for (let step = 0; step < 50; step++) {
      const { value, derivative } = legendre(count, x);
      slope = derivative;
      const change = value / derivative;
      x -= change;
      if (Math.abs(change) < 1e-16) break;
    }
    nodes.push({ node: x, weight: 2 / ((1 - x * x) * slope * slope) });
  }
  return nodes;
}

function legendre(degree: number, x: number): { value: number; derivative: number } {
  let before = 1;
  let value = x;
  for (let k = 2; k <= degree; k++) {
    const next = ((2 * k - 1) * x * value - (k - 1) * before) / k;
    before = value;
    value = next;
  }
  return { value, derivative: (degree * (x * value - before)) / (x * x - 1) };
}

/**
 * Integral of a smooth function by one panel of the 12-point Gauss–Legendre rule. Fast; adequate
 * where the function is close to a polynomial of degree 23 over the panel.
 */
export function integratePanel(f: (x: number) => number, from: number, to: number): number {
  const half = (to - from) / 2;
  const middle = (to + from) / 2;
  let sum = 0;
  for (const { node, weight } of rule) sum += weight * f(middle + half * node);
  return sum * half;
}

/**
 * Integral of a piecewise smooth function, to about 1e-13 of its size: panels are split at the
 * given breaks and then halved until one panel and its two halves agree. `from` may exceed `to`,
 * which changes the sign. Neglects features narrower than the panels' nodes can see.
 */
export function integrate(
  f: (x: number) => number,
  from: number,
  to: number,
  breaks: readonly number[] = [],
): number {
  if (from === to) return 0;
  if (from > to) return -integrate(f, to, from, breaks);
  const inside = breaks.filter((at) => at > from && at < to).sort((a, b) => a - b);
  const ends = [...inside, to];
  const panels = ends.map((end, index) => {
    const start = ends[index - 1] ?? from;
    return { start, end, whole: integratePanel(f, start, end) };
  });
  const size = panels.reduce((sum, { whole }) => sum + Math.abs(whole), 0);
  const effort = { allowed: relativeTolerance * size, halvingsLeft: mostHalvings };
  return panels.reduce(
    (sum, { start, end, whole }) => sum + refine(f, start, end, whole, effort),
    0,
  );
}

interface Effort {
  allowed: number;
  halvingsLeft: number;
}

function refine(
  f: (x: number) => number,
  from: number,
  to: number,
  whole: number,
  effort: Effort,
): number {
  const middle = (from + to) / 2;
  const left = integratePanel(f, from, middle);
  const right = integratePanel(f, middle, to);
  const sum = left + right;
  if (!(Math.abs(sum - whole) > effort.allowed) || effort.halvingsLeft <= 0) return sum;
  effort.halvingsLeft--;
  return refine(f, from, middle, left, effort) + refine(f, middle, to, right, effort);
}

/**
 * The x in `from`…`limit` up to which a positive rate integrates to `target`; `limit` when the
 * whole integral is less. Newton's method kept inside a shrinking bracket, so it cannot leave it.
 * `limit` may be infinite.
 */
export function invertIntegral(
  rate: (x: number) => number,
  from: number,
  limit: number,
  target: number,
  breaks: readonly number[] = [],
): number {
  let low = from;
  let high = limit;
  let x = from;
  let reached = 0;
  for (let step = 0; step < mostSteps; step++) {
    const missing = target - reached;
    if (Math.abs(missing) <= 1e-15 * target) return x;
    if (missing > 0) low = x;
    else high = x;
    let next = x + missing / rate(x);
    if (next >= high) next = high === Infinity ? next : closeIn(x, high, limit);
    else if (next <= low && step > 0) next = (low + high) / 2;
    if (next === x || Math.abs(next - x) <= 2e-16 * Math.abs(x)) return next;
    reached += integrate(rate, x, next, breaks);
    if (next === limit && reached <= target) return limit;
    x = next;
  }
  return x;
}

function closeIn(x: number, high: number, limit: number): number {
  return high === limit ? high : (x + high) / 2;
}
