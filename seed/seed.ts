import { steppedClock } from '../src/lib/clock.ts';
import { addPeriods } from '../src/lib/econ/periods.ts';
import { redraw } from '../src/lib/publication/moments.ts';
import { type Runtime, contextFor } from '../src/lib/runtime.ts';
import type { Actor, ServiceContext } from '../src/lib/services/context.ts';
import { createKey } from '../src/lib/services/keys/create.ts';
import { SCOPES } from '../src/lib/services/keys/scopes.ts';
import type { DemoAccounts } from './accounts.ts';
import { firstMonth, newestMonth, releaseTimes } from './calendar.ts';
import { demoEconomies } from './economies.ts';
import type { DemoEconomy } from './economy.ts';
import { createPeople } from './people.ts';
import { type Step, economySteps } from './steps.ts';
import { demoData } from './vintages.ts';

/** Months of releases in the demo, the newest of them not out everywhere, and in the full one. */
const MONTHS = 4;
const FULL_MONTHS = 24;

/** After how many pages it is told again how far drawing is. */
const PAGES_TOLD = 25;

const SYSTEM = { id: null, role: 'system', name: 'Slackwater' } as const;

const WEEK = 7 * 24 * 3_600_000;

export interface SeedOptions {
  /** The time of seeding: the calendar is laid out around it. */
  now: Date;
  /** Two years of releases instead of the last months. */
  full?: boolean;
  /** Codes of the economies to seed; all of them unless told. */
  economies?: readonly string[];
  /** How many months of releases each economy has, for tests. */
  months?: number;
  /** Told in words what takes time. */
  onProgress(text: string): void;
}

/**
 * Plays the desk's last months through the services of the product, under a clock that steps from one deed to the
 * next up to the time of seeding; the audit rows say so. The database must be migrated and without people.
 */
export async function seedDemo(runtime: Runtime, options: SeedOptions): Promise<DemoAccounts> {
  const economies = chosen(options);
  const count = options.months ?? (options.full ? FULL_MONTHS : MONTHS);
  const newest = newestMonth(options.now);
  const months = Array.from({ length: count }, (_, i) => addPeriods(newest, i - count + 1));
  const start = firstDay(economies, months, options.now);
  const clock = steppedClock(start);
  const as = (actor: Actor): ServiceContext => ({
    ...contextFor(runtime, actor),
    now: () => clock.now(),
    clockNote: 'stepped',
  });

  options.onProgress('Seeding the demo: people');
  const { cast, accounts } = await createPeople(as(SYSTEM));
  const steps = economies.flatMap((economy, i) =>
    economySteps({
      economy,
      data: demoData(economy, firstMonth(options.now)),
      editor: i % 2 === 0 ? cast.editorOne : cast.editorTwo,
      reviewer: cast.reviewer,
      as,
      now: options.now,
      start,
      months,
    }),
  );
  await play(steps, clock, options.onProgress);
  clock.set(options.now);
  await redraw(as(SYSTEM), (done, all) => {
    if (done === all || done % PAGES_TOLD === 0) {
      options.onProgress(`Seeding the demo: pages (${done} of ${all})`);
    }
  });
  const key = await createKey(as(cast.subscriber), { name: 'Demo', scopes: [...SCOPES] });
  return { accounts, api_key: key.plain };
}

async function play(
  steps: Step[],
  clock: { set(time: Date): void },
  onProgress: (text: string) => void,
): Promise<void> {
  const releases = steps.filter((step) => step.progress).length;
  let release = 0;
  for (const step of steps.toSorted((a, b) => a.at.getTime() - b.at.getTime())) {
    clock.set(step.at);
    if (step.progress) {
      release++;
      onProgress(`Seeding the demo: ${step.progress} (${release} of ${releases})`);
    }
    await step.work();
  }
}

function chosen({ economies }: SeedOptions): readonly DemoEconomy[] {
  return economies ? demoEconomies.filter(({ code }) => economies.includes(code)) : demoEconomies;
}

/** A week before anybody has data to work on. */
function firstDay(economies: readonly DemoEconomy[], months: string[], now: Date): Date {
  const loaded = economies.map(({ slot }) => releaseTimes(now, slot, months[0]!).loaded.getTime());
  return new Date(Math.min(...loaded) - WEEK);
}
