import { side, signed, type Side } from '../../lib/charts/figures.ts';
import { periodLabel } from '../../lib/charts/periodLabels.ts';
import { capitalised, listed, numberWord, possessive } from './counting.ts';

/** One economy that has released the month: its name in running text, growth and surprise in log points. */
export interface Released {
  nameInText: string;
  growth: number;
  surprise: number;
}

export interface HomeMonth {
  /** A month, `2031-08`. */
  period: string;
  released: Released[];
  /** How many economies the month will have when all are out. */
  expected: number;
}

/**
 * The home page's headline: how many economies were above, below or at expectation in the month. While some are
 * not out it counts those released so far.
 */
export function homeHeadline(month: HomeMonth): string {
  const { released, expected } = month;
  const name = periodLabel(month.period).split(' ')[0];
  const only = released[0];
  if (!only) return `No release for ${periodLabel(month.period)} yet`;
  const isComplete = released.length >= expected;
  if (released.length === 1) return `${single(only)} in ${name}`;
  const { above, below } = bySide(released);
  const where = (count: number) => place(count, released.length, isComplete);
  const when = isComplete ? `in ${name}` : `for ${name}`;
  if (above.length === 0 && below.length === 0) {
    return `Money grew as expected in ${where(released.length)} ${when}`;
  }
  if (above.length >= below.length) {
    const rest = above.length === below.length ? ` and slower in ${numberWord(below.length)}` : '';
    if (above.some(({ growth }) => growth < 0) || below.some(({ growth }) => rest && growth < 0)) {
      const under = rest && ` and below it in ${numberWord(below.length)}`;
      return `Money growth was above expectation in ${where(above.length)} ${when}${under}`;
    }
    return `Money grew faster than expected in ${where(above.length)} ${when}${rest}`;
  }
  return `Money growth was below expectation in ${where(below.length)} ${when}`;
}

/** The lines under the headline: the largest surprise, then the economies the headline leaves out. */
export function homeStandfirst({ released }: HomeMonth): string {
  const ordered = [...released].sort((a, b) => b.surprise - a.surprise);
  const [first] = [...ordered].sort((a, b) => Math.abs(b.surprise) - Math.abs(a.surprise));
  if (!first) return '';
  const others = ordered.filter((one) => one !== first);
  const figure = signed(first.surprise, 2);
  const lead = `${possessive(first.nameInText)} surprise, ${figure} percentage points,`;
  const sentences = [
    others.length === 0
      ? `The surprise was ${figure} percentage points.`
      : `${lead} was the largest.`,
  ];
  const rest = bySide(others);
  const all = bySide(released);
  if (others.length > 0) {
    if (rest.level.length > 0 && rest.level.length < released.length) {
      sentences.push(`${named(rest.level)} level.`);
    }
    const led: Side = all.above.length >= all.below.length ? 'above' : 'below';
    const opposite = led === 'above' ? rest.below : rest.above;
    if (opposite.length > 0) {
      sentences.push(`${named(opposite)} ${led === 'above' ? 'below' : 'above'} expectation.`);
    }
  }
  return sentences.map(capitalised).join(' ');
}

function bySide(released: Released[]): Record<Side, Released[]> {
  const sides: Record<Side, Released[]> = { above: [], below: [], level: [] };
  for (const one of released) sides[side(one.surprise)].push(one);
  return sides;
}

function single({ nameInText, growth, surprise }: Released): string {
  const where = side(surprise);
  const money = capitalised(`${possessive(nameInText)} money`);
  if (where === 'level') return `${money} grew as expected`;
  if (where === 'above' && growth >= 0) return `${money} grew faster than expected`;
  return `${money} growth was ${where} expectation`;
}

function place(count: number, all: number, isComplete: boolean): string {
  const economies = isComplete ? 'economies' : 'economies released so far';
  if (count === all)
    return isComplete ? `all ${numberWord(all)} economies` : `all ${numberWord(all)} ${economies}`;
  return isComplete
    ? `${numberWord(count)} of ${numberWord(all)} economies`
    : `${numberWord(count)} of the ${numberWord(all)} ${economies}`;
}

function named(released: Released[]): string {
  const names = listed(released.map(({ nameInText }) => nameInText));
  return `${names} ${released.length === 1 && !released[0]!.nameInText.startsWith('the ') ? 'was' : 'were'}`;
}
