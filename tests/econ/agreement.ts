/** Relative tolerance of the method, section 10. */
const TOLERANCE = 1e-8;
const SMALL_P = 1e-12;

/** One place where a result was compared: the field without array indices, and the deviation on the method's scale. */
export interface Comparison {
  field: string;
  deviation: number;
  agrees: boolean;
  got: unknown;
  expected: unknown;
}

/** Fields whose numbers must be equal: counts, orders and lags. */
const EXACT = new Set(['lags', 'observations', 'order']);

/** `null`, an array of nulls and an absent object are the same thing (SOURCES.md). */
function isNothing(value: unknown): boolean {
  if (value === null || value === undefined) return true;
  if (Array.isArray(value)) return value.length > 0 && value.every(isNothing);
  return (
    typeof value === 'object' &&
    Object.values(value).length > 0 &&
    Object.values(value).every(isNothing)
  );
}

/** Compares a result with expected values field by field, by the rules of SOURCES.md. */
export function compare(got: unknown, expected: unknown, field = ''): Comparison[] {
  const name = field.slice(field.lastIndexOf('.') + 1);
  const verdict = (agrees: boolean, deviation = agrees ? 0 : Infinity): Comparison[] => [
    { field, deviation, agrees, got, expected },
  ];
  if (name === 'reason')
    return verdict((typeof got === 'string') === (typeof expected === 'string'));
  if (isNothing(expected)) return verdict(isNothing(got));
  if (Array.isArray(expected)) {
    if (!Array.isArray(got) || got.length !== expected.length) return verdict(false);
    const scale = largest(expected);
    const each = expected.map((value, i) => compareValue(got[i], value, name, scale));
    const worst = each.reduce((a, b) => (b.deviation > a.deviation ? b : a), {
      deviation: 0,
      agrees: true,
    });
    return verdict(
      each.every((one) => one.agrees),
      worst.deviation,
    );
  }
  if (typeof expected === 'object' && expected !== null) {
    if (typeof got !== 'object' || got === null) return verdict(false);
    return Object.entries(expected).flatMap(([key, value]) =>
      compare((got as Record<string, unknown>)[key], value, field === '' ? key : `${field}.${key}`),
    );
  }
  const { agrees, deviation } = compareValue(got, expected, name, Math.abs(Number(expected)));
  return verdict(agrees, deviation);
}

function compareValue(got: unknown, expected: unknown, name: string, scale: number) {
  if (typeof expected !== 'number' || EXACT.has(name)) {
    const agrees = (got ?? null) === expected;
    return { agrees, deviation: agrees ? 0 : Infinity };
  }
  if (typeof got !== 'number' || !Number.isFinite(got))
    return { agrees: false, deviation: Infinity };
  const difference = Math.abs(got - expected);
  const deviation = difference === 0 ? 0 : difference / Math.max(Math.abs(expected), 1e-3 * scale);
  const agrees = deviation <= TOLERANCE || (name === 'p' && difference <= SMALL_P);
  return { agrees, deviation: agrees && deviation > TOLERANCE ? 0 : deviation };
}

function largest(values: unknown[]): number {
  return values.reduce<number>(
    (most, value) => (typeof value === 'number' ? Math.max(most, Math.abs(value)) : most),
    0,
  );
}
