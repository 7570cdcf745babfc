import { z } from 'zod';
import { record } from '../audit.ts';
import { type ServiceContext, ServiceError } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { seriesId } from '../series/concepts.ts';
import { transact } from '../transact.ts';

/** Series an economy may have, money first; also the columns of a data file. */
export const CONCEPTS = ['money', 'prices', 'activity'] as const;
export type Concept = (typeof CONCEPTS)[number];

const text = (what: string, most = 200) =>
  z
    .string(`Enter ${what}.`)
    .trim()
    .min(1, `Enter ${what}.`)
    .max(most, `Use at most ${most} characters.`);

const seriesFields = z.object({
  title: text('a title'),
  unit: text('the unit'),
  timing: z.enum(['end', 'average'], 'Choose end of period or average.').nullable(),
  adjustment: z.enum(['adjusted', 'unadjusted'], 'Choose adjusted or not adjusted.'),
  source: text('the source', 500),
  licence: text('the licence'),
  serveValues: z.boolean(),
});

const newEconomy = z.object({
  code: z
    .string()
    .trim()
    .toUpperCase()
    .regex(/^[A-Z]{3}$/, 'Enter three letters, such as XAL.'),
  name: text('a name'),
  nameInText: text('the name as it stands in a sentence, such as “the Brannoch Isles”'),
  currency: text('the currency'),
  frequency: z.enum(['monthly', 'quarterly', 'annual'], 'Choose monthly, quarterly or annual.'),
  contact: text('the desk’s contact'),
  series: z.object({
    money: seriesFields,
    prices: seriesFields.optional(),
    activity: seriesFields.optional(),
  }),
});

/** What describes one input series. */
export type SeriesMetadata = z.input<typeof seriesFields>;
export type NewEconomy = z.input<typeof newEconomy>;

/** A new economy with what describes its input series; money always, prices and activity where it has them. */
export async function createEconomy(ctx: ServiceContext, input: NewEconomy): Promise<string> {
  const actor = requirePermission(ctx.actor, 'economies.edit');
  const { series, ...economy } = parseInput(newEconomy, input);
  return transact(ctx, async (trx) => {
    const at = trx.now();
    const made = await trx.db
      .insertInto('economy')
      .values({
        code: economy.code,
        name: economy.name,
        name_in_text: economy.nameInText,
        currency: economy.currency,
        frequency: economy.frequency,
        contact: economy.contact,
        created_at: at,
        created_by: actor.id,
      })
      .onConflict((conflict) => conflict.doNothing())
      .returning('code')
      .executeTakeFirst();
    if (!made) {
      throw new ServiceError('conflict', `There is an economy ${economy.code} already.`, [
        { field: 'code', message: 'Enter a code that no economy has.' },
      ]);
    }
    const rows = CONCEPTS.flatMap((concept) => {
      const about = series[concept];
      if (!about) return [];
      const { serveValues, ...rest } = about;
      return {
        id: seriesId(economy.code, concept, economy.frequency),
        economy_code: economy.code,
        concept,
        ...rest,
        serve_values: serveValues,
        created_at: at,
      };
    });
    await trx.db.insertInto('series').values(rows).execute();
    await record(trx, {
      action: 'economy.created',
      subject: `economy ${economy.code}`,
      detail: { ...economy, series: rows.map((row) => row.id) },
    });
    return economy.code;
  });
}
