import type { Gap, Slope } from '../types.ts';
import type { Fields, Path, Reader } from './reader.ts';

const METHODS = ['fixed', 'structural', 'prices', 'activity'] as const;
type Method = (typeof METHODS)[number];

const FIELDS: Record<Method, readonly string[]> = {
  fixed: ['method', 'b', 'se_lambda'],
  structural: ['method', 'gamma', 'eta', 'relative_demand_variance', 'money_variance'],
  prices: ['method', 'window', 'lags'],
  activity: ['method', 'window', 'lags'],
};

const positive = (value: number) => value > 0;

/** Reads `slope`: where the output share of a surprise comes from. */
export function readSlope(reader: Reader, value: unknown, path: Path): Slope | undefined {
  const fields = reader.object(value, path, 'The slope');
  if (fields === undefined) return undefined;
  const method = reader.choice(fields.method, [...path, 'method'], 'The method', METHODS);
  if (method === undefined) return undefined;
  reader.only(fields, path, FIELDS[method], unusedBy(method));
  if (method === 'fixed') return readFixed(reader, fields, path);
  if (method === 'structural') return readStructural(reader, fields, path);
  const slope: Slope = { method };
  if (fields.window !== undefined) {
    const window = reader.object(fields.window, [...path, 'window'], "The slope's window");
    if (window !== undefined) {
      reader.only(window, [...path, 'window'], ['length']);
      const length = reader.integer(
        window.length,
        [...path, 'window', 'length'],
        "The length of the slope's window",
        1,
      );
      if (length !== undefined) slope.window = { length };
    }
  }
  if (fields.lags !== undefined) {
    const lags = reader.integer(fields.lags, [...path, 'lags'], 'The number of lags', 0);
    if (lags !== undefined) slope.lags = lags;
  }
  return slope;
}

function readFixed(reader: Reader, fields: Fields, path: Path): Slope | undefined {
  const b = reader.number(fields.b, [...path, 'b'], 'The slope b', 'a number above 0', positive);
  const error =
    fields.se_lambda === undefined
      ? undefined
      : reader.number(
          fields.se_lambda,
          [...path, 'se_lambda'],
          'The standard error se_lambda',
          'a number of at least 0',
          (value) => value >= 0,
        );
  if (b === undefined) return undefined;
  return error === undefined ? { method: 'fixed', b } : { method: 'fixed', b, se_lambda: error };
}

function readStructural(reader: Reader, fields: Fields, path: Path): Slope | undefined {
  const at = (name: string) => [...path, name];
  const gamma = reader.number(
    fields.gamma,
    at('gamma'),
    'The labour-supply curvature gamma',
    'a number above 1',
    (value) => value > 1,
  );
  const eta = reader.number(
    fields.eta,
    at('eta'),
    'The demand elasticity eta',
    'a number above 0',
    positive,
  );
  const demand = reader.number(
    fields.relative_demand_variance,
    at('relative_demand_variance'),
    'The variance of relative demand',
    'a number above 0',
    positive,
  );
  const money =
    fields.money_variance === undefined || fields.money_variance === null
      ? null
      : reader.number(
          fields.money_variance,
          at('money_variance'),
          'The variance of money',
          'a number of at least 0, or null for that of the surprises',
          (value) => value >= 0,
        );
  if (gamma === undefined || eta === undefined || demand === undefined || money === undefined) {
    return undefined;
  }
  return {
    method: 'structural',
    gamma,
    eta,
    relative_demand_variance: demand,
    money_variance: money,
  };
}

/** Reads `gap`: how persistent output's response is. */
export function readGap(reader: Reader, value: unknown, path: Path): Gap | undefined {
  if (value === undefined) return { persistence: 'none' };
  const fields = reader.object(value, path, 'The gap');
  if (fields === undefined) return undefined;
  reader.only(fields, path, ['persistence']);
  const { persistence } = fields;
  if (persistence === undefined) return { persistence: 'none' };
  if (persistence === 'none' || persistence === 'estimated') return { persistence };
  const bounds = '"none", "estimated" or a number from 0 to below 1';
  const given = reader.number(
    persistence,
    [...path, 'persistence'],
    'The persistence',
    bounds,
    (value) => value >= 0 && value < 1,
  );
  return given === undefined ? undefined : { persistence: given };
}

function unusedBy(method: Method): Record<string, string> {
  const all = new Set(Object.values(FIELDS).flat());
  const unused = [...all].filter((name) => !FIELDS[method].includes(name));
  return Object.fromEntries(
    unused.map((name) => [name, `The slope method ${method} has no ${name}; leave the field out.`]),
  );
}
