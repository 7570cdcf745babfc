import type { Assumptions } from '../../econ/types.ts';
import type { ServiceContext } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';

export interface DeskSpecification {
  id: string;
  economyCode: string;
  economyName: string;
  version: number;
  assumptions: Assumptions;
  reason: string;
  holdsFrom: string;
  createdAt: Date;
  createdBy: { id: string; name: string };
  /** Null until a reviewer has approved it. */
  approvedAt: Date | null;
  approvedBy: string | null;
}

/** Specifications of all economies or one, newest version first within each. */
export async function listSpecifications(
  ctx: ServiceContext,
  economy?: string,
): Promise<DeskSpecification[]> {
  requirePermission(ctx.actor, 'drafts.see');
  let query = ctx.db
    .selectFrom('specification as s')
    .innerJoin('economy as e', 'e.code', 's.economy_code')
    .innerJoin('person as author', 'author.id', 's.created_by')
    .leftJoin('person as reader', 'reader.id', 's.approved_by')
    .selectAll('s')
    .select(['e.name as economy_name', 'author.name as author', 'reader.name as reader'])
    .orderBy('e.name')
    .orderBy('s.version', 'desc');
  if (economy) query = query.where('s.economy_code', '=', economy);
  return (await query.execute()).map((row) => ({
    id: row.id,
    economyCode: row.economy_code,
    economyName: row.economy_name,
    version: row.version,
    assumptions: row.assumptions as Assumptions,
    reason: row.reason,
    holdsFrom: row.holds_from,
    createdAt: row.created_at,
    createdBy: { id: row.created_by, name: row.author },
    approvedAt: row.approved_at,
    approvedBy: row.reader,
  }));
}
