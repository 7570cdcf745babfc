import { coefficientsOf } from '../expectations/coefficients.ts';
import type { Expectation, Frequency, Seasonal, Window } from '../types.ts';
import type { Fields, Path, Reader } from './reader.ts';

const RULES = ['random_walk', 'autoregression', 'adaptive', 'survey'] as const;
type Rule = (typeof RULES)[number];

const FIELDS: Record<Rule, readonly string[]> = {
  random_walk: ['rule', 'seasonal', 'window'],
  autoregression: ['rule', 'order', 'seasonal', 'window'],
  adaptive: ['rule', 'gain', 'seasonal', 'window'],
  survey: ['rule', 'seasonal'],
};

const LARGEST_ORDER = 24;

/** Reads `expectation`: how growth is expected, from which window. */
export function readExpectation(
  reader: Reader,
  value: unknown,
  path: Path,
  frequency: Frequency | undefined,
): Expectation | undefined {
  const fields = reader.object(value, path, 'The expectation');
  if (fields === undefined) return undefined;
  const rule = reader.choice(fields.rule, [...path, 'rule'], 'The rule', RULES);
  if (rule === undefined) return undefined;
  reader.only(fields, path, FIELDS[rule], unusedBy(rule));
  const seasonal = readSeasonal(reader, fields.seasonal, [...path, 'seasonal'], rule, frequency);
  if (rule === 'survey') return { rule, seasonal: 'none' };

  const window = readWindow(reader, fields.window, [...path, 'window'], rule);
  const gain =
    rule === 'adaptive'
      ? reader.number(
          fields.gain,
          [...path, 'gain'],
          'The gain',
          'a number above 0 and at most 1',
          (gain) => gain > 0 && gain <= 1,
        )
      : undefined;
  const order = rule === 'autoregression' ? readOrder(reader, fields, path) : undefined;
  if (window === undefined) return undefined;

  const learns: Expectation =
    rule === 'autoregression'
      ? { rule, order: order ?? 0, seasonal, window }
      : { rule: 'random_walk', seasonal, window };
  const coefficients = coefficientsOf(learns, frequency ?? 'annual');
  if (window.length <= coefficients) {
    reader.fault(
      [...path, 'window', 'length'],
      `The window's length must be at least ${coefficients + 1}, as the rule has ${coefficients} ${coefficients === 1 ? 'coefficient' : 'coefficients'} to learn from it, not ${window.length}.`,
    );
  }
  if (rule === 'adaptive') {
    return gain === undefined ? undefined : { rule, gain, seasonal: 'none', window };
  }
  if (rule === 'random_walk') return { rule, seasonal, window };
  return order === undefined ? undefined : { rule, order, seasonal, window };
}

function readSeasonal(
  reader: Reader,
  value: unknown,
  path: Path,
  rule: Rule,
  frequency: Frequency | undefined,
): Seasonal {
  if (value === undefined) return 'none';
  const seasonal = reader.choice(value, path, 'The seasonal setting', ['none', 'dummies']);
  if (seasonal !== 'dummies') return 'none';
  if (rule === 'adaptive' || rule === 'survey') {
    reader.fault(
      path,
      `Seasonal indicators work with random_walk and autoregression only; the rule ${rule} does not use them.`,
    );
    return 'none';
  }
  if (frequency === 'annual') {
    reader.fault(
      path,
      'Annual data have no seasons, so seasonal indicators cannot be used with them.',
    );
    return 'none';
  }
  return seasonal;
}

function readWindow(reader: Reader, value: unknown, path: Path, rule: Rule): Window | undefined {
  const fields = reader.object(value, path, 'The window');
  if (fields === undefined) return undefined;
  reader.only(fields, path, ['kind', 'length']);
  const optional = rule === 'adaptive' && fields.kind === undefined;
  const kind = optional
    ? 'expanding'
    : reader.choice(fields.kind, [...path, 'kind'], "The window's kind", ['expanding', 'rolling']);
  const length = reader.integer(fields.length, [...path, 'length'], "The window's length", 1);
  return kind === undefined || length === undefined ? undefined : { kind, length };
}

function readOrder(
  reader: Reader,
  fields: Fields,
  path: Path,
): number | { criterion: 'bic'; max: number } | undefined {
  const { order } = fields;
  const at = [...path, 'order'];
  if (typeof order !== 'object' || order === null || Array.isArray(order)) {
    return reader.integer(order, at, 'The order', 0, LARGEST_ORDER);
  }
  const choice = order as Fields;
  reader.only(choice, at, ['criterion', 'max']);
  const criterion = reader.choice(choice.criterion, [...at, 'criterion'], 'The criterion', ['bic']);
  const max = reader.integer(choice.max, [...at, 'max'], 'The largest order', 0, LARGEST_ORDER);
  return criterion === undefined || max === undefined ? undefined : { criterion, max };
}

function unusedBy(rule: Rule): Record<string, string> {
  const all = new Set(Object.values(FIELDS).flat());
  const unused = [...all].filter((name) => !FIELDS[rule].includes(name));
  return Object.fromEntries(
    unused.map((name) => [name, `The rule ${rule} has no ${name}; leave the field out.`]),
  );
}
