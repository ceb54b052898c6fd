import { Op } from "sequelize";

import { visibleChapters, type Access } from "@/lib/auth/gate";
import { flagIncludes, flagOrder, flagWhere } from "@/lib/flags/flag-list-query";
import type { FlagQuery } from "@/lib/flags/flag-query";
import { Flag } from "@/models";

/** A queue longer than this is leafed through page by page, not flag by flag. */
const LONGEST = 500;

export type Neighbours = { position: number; of: number; previous: string | null; next: string | null };

/**
 * Where a flag stands in the queue that its reader came from. A flag that has left that queue, because it was just
 * settled, is followed by the first of those that remain.
 */
export async function flagNeighbours(
  workId: string,
  flagId: string,
  query: FlagQuery,
  access: Access,
): Promise<Neighbours> {
  const rows = await Flag.findAll({
    attributes: ["id"],
    where: { [Op.and]: [{ workId, ...visibleChapters(access) }, flagWhere(query, access.userId)] },
    include: flagIncludes(query).map((part) => ({ ...part, attributes: [] })),
    order: flagOrder(query),
    limit: LONGEST,
    subQuery: false,
  });
  const ids = rows.map(({ id }) => id);
  const at = ids.indexOf(flagId);
  return {
    position: at + 1,
    of: ids.length,
    previous: at > 0 ? (ids[at - 1] ?? null) : null,
    next: ids[at + 1] ?? null,
  };
}
