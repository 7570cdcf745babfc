import type { Db } from '../../../db/connection.ts';
import { changedEconomies } from '../../../db/queries/changedEconomies.ts';
import { currentHashes } from '../../../db/queries/published.ts';
import type { ServiceContext } from '../services/context.ts';
import { listEconomies } from '../services/economies/public.ts';
import { listReleases } from '../services/releases/public.ts';
import type { View } from '../services/view.ts';
import { type Kept, keep } from './artefacts.ts';
import { type PlacedFile, filesOf } from './files.ts';
import { type Planned, SITE_PAGES, economyPage, releasePages } from './plan.ts';

/** How long after drawing an immediate change counts, so that every process has it before it does. */
export const IMMEDIATE_MS = 3_000;

/** A scheduled release whose second is still to come. */
export interface Coming extends Planned {
  id: string;
  at: Date;
  vintageId: string;
}

/** What an address will answer. */
export interface Row {
  address: string;
  kept: Kept;
  status: number;
  headers: Record<string, string>;
  isPage: boolean;
  /** What was committed by then is in it. */
  drawnAt: Date;
}

/** The pages and files of a coming moment, as they will be at its second. */
export async function drawMoment(
  ctx: ServiceContext,
  at: Date,
  releases: Coming[],
): Promise<Row[]> {
  const drawnAt = ctx.now();
  const view: View = { at, rehearsedAt: drawnAt };
  const pages = new Set<string>(SITE_PAGES);
  const files: PlacedFile[] = [];
  for (const release of releases) {
    pages.add(economyPage(release.economyCode));
    for (const address of releasePages(release)) pages.add(address);
    for (const address of await pagesBefore(ctx, view, release)) pages.add(address);
    files.push(...(await filesOf(ctx, view, release)));
  }
  const rows = await Promise.all([...pages].map((address) => drawPage(ctx, address, view)));
  for (const { address, kept } of files) {
    const headers = {
      'content-type': kept.mediaType,
      'x-content-type-options': 'nosniff',
      'access-control-allow-origin': '*',
      // An image opened by itself is a document: it may do nothing.
      'content-security-policy': "default-src 'none'; sandbox",
    };
    rows.push({ address, kept, status: 200, headers, isPage: false, drawnAt });
  }
  return rows;
}

/** The pages of the month before, which lead on to this one. */
async function pagesBefore(ctx: ServiceContext, view: View, release: Planned): Promise<string[]> {
  const all = await listReleases(ctx.db, view, { economy: release.economyCode });
  const [before] = all
    .filter(({ period }) => period < release.period)
    .toSorted((a, b) => (a.period < b.period ? 1 : -1));
  return before ? releasePages(before) : [];
}

/**
 * What changed outside of any moment, drawn as it is now: announced dates and specifications, in the pages of their
 * economies, in the newest explainer, which names the next date, and in the pages of the site.
 */
export async function drawImmediate(ctx: ServiceContext): Promise<Row[]> {
  const now = ctx.now();
  const changed = await changes(ctx.db, now);
  if (!changed) return [];
  const economies = await listEconomies(ctx.db, { at: now });
  const ofChanged = economies
    .filter(({ economy }) => changed.includes(economy.code))
    .flatMap(({ economy, latest }) => [
      economyPage(economy.code),
      ...(latest ? releasePages(latest) : []),
    ]);
  const pages = [...SITE_PAGES, ...ofChanged];
  const rows = await Promise.all(pages.map((address) => drawPage(ctx, address, { at: now })));
  const inForce = await currentHashes(ctx.db, pages, now);
  // The page of a changed economy is put in force even where it looks the same: it is what says that it was drawn.
  return rows.filter(
    (row) => ofChanged.includes(row.address) || inForce.get(row.address) !== row.kept.hash,
  );
}

/** Codes of the economies that changed outside of any moment; null where nothing did, and the site has its pages. */
export async function changes(db: Db, at: Date): Promise<string[] | null> {
  const effective = new Date(at.getTime() + IMMEDIATE_MS);
  const changed = await changedEconomies(db, at, effective);
  if (changed.length > 0) return changed;
  return (await currentHashes(db, ['/'], effective)).has('/') ? null : [];
}

/** One page at a view's instant, kept in the store. @throws Error where it answers anything but itself */
export async function drawPage(ctx: ServiceContext, address: string, view: View): Promise<Row> {
  // Drawn again later, a page still shows its own instant.
  const drawnAt = new Date(Math.min(ctx.now().getTime(), view.at.getTime()));
  const page = await ctx.workers.page(address, view);
  const expected = address === '/404/' ? 404 : 200;
  if (page.status !== expected) {
    throw new Error(`${address} answered ${page.status} while it was drawn`);
  }
  const mediaType = page.headers['content-type'] ?? 'text/html; charset=utf-8';
  const kept = await keep(ctx, page.body, mediaType);
  return { address, kept, status: page.status, headers: page.headers, isPage: true, drawnAt };
}
