import { z } from 'zod';
import { record } from '../audit.ts';
import type { ServiceContext } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { addContributor } from './contributors.ts';
import { lockedRelease, requireDraft, requireVersion } from './locked.ts';

/** How long the words of a release may be, in characters. */
export const WORDS = { headline: 120, explainer: 20_000 };

/** How many marks of quotations and lists may open a line: readers get lost, and so does a parser's stack. */
const MARKS = 5;
const TOO_MANY_MARKS = new RegExp(
  String.raw`^[ \t]*(?:>[ \t]*|(?:[-+*]|\d{1,9}[.)])[ \t]+){${MARKS + 1}}`,
  'm',
);

/** Whether a line of this Markdown opens more quotations and lists inside each other than an explainer may. */
export function nestsTooDeep(markdown: string): boolean {
  return TOO_MANY_MARKS.test(markdown);
}

const words = z.object({
  id: z.string(),
  version: z.number().int(),
  headline: z
    .string()
    .trim()
    .max(WORDS.headline, `Use at most ${WORDS.headline} characters.`)
    .regex(/^[^\r\n]*$/, 'Keep the headline on one line.'),
  explainer: z
    .string()
    .transform((text) => text.replace(/\r\n?/g, '\n').trim())
    .pipe(
      z
        .string()
        .max(WORDS.explainer, `Use at most ${WORDS.explainer.toLocaleString('en-GB')} characters.`)
        .refine(
          (text) => !nestsTooDeep(text),
          `Begin no line with more than ${MARKS} marks of quotations or lists.`,
        ),
    ),
});

export interface ReleaseWords {
  id: string;
  /** The version of the release the person saw. */
  version: number;
  headline: string;
  /** Markdown. */
  explainer: string;
}

/**
 * Saves headline and explainer of a draft; answers its version.
 * @throws ServiceError `conflict` where somebody else has saved since: nothing is overwritten.
 */
export async function writeRelease(ctx: ServiceContext, input: ReleaseWords): Promise<number> {
  const actor = requirePermission(ctx.actor, 'releases.draft');
  const { id, version, headline, explainer } = parseInput(words, input);
  return transact(ctx, async (trx) => {
    const release = await lockedRelease(trx, id);
    // The same words again are no change and no conflict: a form sent twice finds the release already in review.
    if (release.headline === headline && release.explainer === explainer) return release.version;
    requireDraft(release);
    requireVersion(release, version);
    await trx.db
      .updateTable('release')
      .set({ headline, explainer, version: version + 1 })
      .where('id', '=', id)
      .execute();
    await addContributor(trx, id, actor.id, 'words');
    await record(trx, {
      action: 'release.written',
      subject: `release ${id}`,
      detail: { version: version + 1, headline, characters: explainer.length },
    });
    return version + 1;
  });
}
