import { periodLabel } from '../src/lib/charts/figures.ts';
import { addPeriods, periodDifference } from '../src/lib/econ/periods.ts';
import type { ComputeResult } from '../src/lib/econ/types.ts';
import { announce } from '../src/lib/services/calendar/announce.ts';
import type { ServiceContext } from '../src/lib/services/context.ts';
import { createEconomy } from '../src/lib/services/economies/create.ts';
import type { SignedIn } from '../src/lib/services/people/permissions.ts';
import { approveRelease } from '../src/lib/services/releases/approve.ts';
import { computeRelease } from '../src/lib/services/releases/compute.ts';
import { draftRelease } from '../src/lib/services/releases/draft.ts';
import { getDeskRelease } from '../src/lib/services/releases/get.ts';
import { scheduleRelease } from '../src/lib/services/releases/schedule.ts';
import { submitRelease } from '../src/lib/services/releases/submit.ts';
import { writeRelease } from '../src/lib/services/releases/write.ts';
import { approveSpecification } from '../src/lib/services/specifications/approve.ts';
import { draftSpecification } from '../src/lib/services/specifications/draft.ts';
import { acceptVintage } from '../src/lib/services/vintages/accept.ts';
import { firstMonth, releaseTimes } from './calendar.ts';
import type { DemoEconomy, DemoSeries, DemoSpecification } from './economy.ts';
import { releaseWords } from './text.ts';
import { withoutDrawing } from './undrawn.ts';
import { type DemoData, vintageCsv } from './vintages.ts';

/** One thing that somebody at the desk does at a time. */
export interface Step {
  at: Date;
  /** Told when it begins; only for the step of a release that takes longest. */
  progress?: string;
  work(): Promise<void>;
}

/** An economy in the hands of the desk: who works on it, from when, and for which months. */
export interface Assignment {
  economy: DemoEconomy;
  data: DemoData;
  editor: SignedIn;
  reviewer: SignedIn;
  /** The context of a verb that this person calls at the time of the step. */
  as(person: SignedIn): ServiceContext;
  /** The time of seeding: nothing later has happened. */
  now: Date;
  start: Date;
  months: readonly string[];
}

/** A version of the specification at the desk: from when it holds and, once drafted, what it is called by. */
interface Version extends DemoSpecification {
  holdsFrom: string;
  id: string;
}

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const ANNOUNCED_AHEAD = 45 * DAY;

/** How long before the data of its first month a later version is drafted, and how soon after that approved. */
const VERSION_AHEAD = 4 * DAY;
const VERSION_READ_WITHIN = DAY;

const CONTACT = 'Slackwater desk, desk@example.org';
const LICENCE = 'CC BY 4.0';

/** What the desk did for an economy up to the time of seeding, each step through the service a person would use. */
export function economySteps(assignment: Assignment): Step[] {
  const { economy, months, now } = assignment;
  const versions = economy.specifications.map((specification) => ({
    ...specification,
    holdsFrom: months.slice(-(specification.newestMonths ?? months.length))[0]!,
    id: '',
  }));
  const steps = [
    foundingStep(assignment),
    ...versions.flatMap((version, i) => versionSteps(assignment, version, i === 0)),
    ...announcementSteps(assignment),
    ...months.flatMap((period) => releaseSteps(assignment, inForce(versions, period), period)),
  ];
  return steps.filter((step) => step.at <= now);
}

/** The newest version that holds for a month; the first one holds for all. */
function inForce(versions: Version[], period: string): Version {
  return versions.findLast(({ holdsFrom }) => periodDifference(holdsFrom, period) >= 0)!;
}

function foundingStep({ economy, editor, as, start }: Assignment): Step {
  const { code, name, nameInText, currency } = economy;
  const { money, prices, activity } = economy.series;
  const series = {
    money: described(money),
    prices: described(prices),
    activity: described(activity),
  };
  return {
    at: new Date(start.getTime() + HOUR),
    async work() {
      await createEconomy(as(editor), {
        code,
        name,
        nameInText,
        currency,
        frequency: 'monthly',
        contact: CONTACT,
        series,
      });
    },
  };
}

function versionSteps(assignment: Assignment, version: Version, isFirst: boolean): Step[] {
  const { economy, editor, reviewer, as, start, now } = assignment;
  const { reason, holdsFrom, assumptions } = version;
  const firstData = releaseTimes(now, economy.slot, holdsFrom).loaded.getTime();
  const drafted = isFirst ? start.getTime() + 2 * HOUR : firstData - VERSION_AHEAD;
  return [
    {
      at: new Date(drafted),
      async work() {
        const specification = { economy: economy.code, reason, holdsFrom, assumptions };
        version.id = (await draftSpecification(as(editor), specification)).id;
      },
    },
    {
      at: new Date(drafted + (isFirst ? HOUR : VERSION_READ_WITHIN)),
      work: () => approveSpecification(withoutDrawing(as(reviewer)), version.id),
    },
  ];
}

/** What is still to come at seeding stands in the calendar weeks ahead; older dates were told when scheduled. */
function announcementSteps({ economy, reviewer, as, now, start, months }: Assignment): Step[] {
  return [...months, addPeriods(months.at(-1)!, 1)].flatMap((period) => {
    const { due } = releaseTimes(now, economy.slot, period);
    if (due <= now) return [];
    const earliest = start.getTime() + 4 * HOUR;
    const at = new Date(Math.max(earliest, due.getTime() - ANNOUNCED_AHEAD));
    const announcement = { economy: economy.code, period, dueAt: due };
    return [{ at, work: () => announce(withoutDrawing(as(reviewer)), announcement) }];
  });
}

function described(series: DemoSeries) {
  return { ...series, licence: LICENCE, serveValues: true };
}

function releaseSteps(assignment: Assignment, version: Version, period: string): Step[] {
  const { economy, editor, reviewer, as } = assignment;
  const times = releaseTimes(assignment.now, economy.slot, period);
  let vintageId: string;
  let id: string;
  let result: ComputeResult;
  const seenBy = async (person: SignedIn) => (await getDeskRelease(as(person), id)).release.version;
  return [
    {
      at: times.loaded,
      async work() {
        const vintage = newVintage(assignment, period, times.source);
        vintageId = (await acceptVintage(as(editor), vintage)).id;
      },
    },
    {
      at: times.computed,
      async work() {
        id = await draftRelease(as(editor), {
          economy: economy.code,
          period,
          vintageId,
          specificationId: version.id,
        });
        result = await computeRelease(as(editor), id);
      },
    },
    {
      at: times.written,
      async work() {
        const { code, nameInText } = economy;
        const { assumptions } = version;
        const words = releaseWords({ code, nameInText, period, result, assumptions });
        await writeRelease(as(editor), { id, version: await seenBy(editor), ...words });
      },
    },
    { at: times.submitted, work: () => submitRelease(as(editor), id) },
    {
      at: times.approved,
      progress: `${economy.name}, ${periodLabel(period)}`,
      work: async () => approveRelease(as(reviewer), { id, version: await seenBy(reviewer) }),
    },
    {
      at: times.scheduled,
      work: () => scheduleRelease(withoutDrawing(as(reviewer)), { id, at: times.due }),
    },
  ];
}

function newVintage({ economy, data, now }: Assignment, period: string, sourcePublishedAt: Date) {
  const start = firstMonth(now);
  const position = periodDifference(start, period);
  const before = periodLabel(addPeriods(period, -1));
  const note = [`Money for ${before} is revised.`];
  if (position === economy.pricesRebasedFrom) note.push('Prices have a new base year.');
  return {
    economy: economy.code,
    fileName: `${economy.code}-${period}.csv`,
    bytes: new TextEncoder().encode(vintageCsv(data.vintage(position), start)),
    sourcePublishedAt,
    note: note.join(' '),
  };
}
