/** Parameters of the structural slope; variances in squared log points a period. */
export interface StructuralParameters {
  gamma: number;
  eta: number;
  relativeDemandVariance: number;
  moneyVariance: number;
}

/**
 * Every positive b with b·[(1+b)² + s(η+b)²] = K(1+b)², K = 1/(γ−1), s = V_m/V_z, ascending: the slope that
 * producers who cannot tell a relative from a general demand shock choose (Lucas 1973; method, section 3).
 *
 * A root lies in (0, K]. The turning points of the cubic cut that interval into pieces on which it is monotone, and
 * bisection runs on each until no number lies between its ends.
 */
export function structuralRoots(parameters: StructuralParameters): number[] {
  const K = 1 / (parameters.gamma - 1);
  const s = parameters.moneyVariance / parameters.relativeDemandVariance;
  const { eta } = parameters;
  const excess = (b: number) =>
    b * ((1 + b) * (1 + b) + s * (eta + b) * (eta + b)) - K * (1 + b) * (1 + b);

  const turning = quadraticRoots(3 * (1 + s), 2 * (2 + 2 * s * eta - K), 1 + s * eta * eta - 2 * K);
  const ends = [0, ...turning.filter((b) => b > 0 && b < K), K];
  const roots: number[] = [];
  for (let i = 1; i < ends.length; i++) {
    const low = ends[i - 1]!;
    const high = ends[i]!;
    if (excess(high) === 0) roots.push(high);
    else if (excess(low) < 0 !== excess(high) < 0 && excess(low) !== 0) {
      roots.push(bisect(excess, low, high));
    }
  }
  return roots;
}

/** Real roots of ax² + bx + c, ascending, without cancellation. */
function quadraticRoots(a: number, b: number, c: number): number[] {
  const discriminant = b * b - 4 * a * c;
  if (!(discriminant > 0)) return [];
  const q = -(b + (b < 0 ? -1 : 1) * Math.sqrt(discriminant)) / 2;
  return [q / a, c / q].sort((first, second) => first - second);
}

function bisect(f: (x: number) => number, low: number, high: number): number {
  const negativeLow = f(low) < 0;
  for (;;) {
    const middle = low + (high - low) / 2;
    if (middle <= low || middle >= high) return middle;
    if (f(middle) < 0 === negativeLow) low = middle;
    else high = middle;
  }
}
