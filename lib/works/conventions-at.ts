import type { Transaction } from "sequelize";

import { DEFAULT_CONVENTIONS, type Conventions } from "@/lib/verify/conventions";
import { ConventionsSheet } from "@/models";

/** The choices of one version of a work's conventions sheet; what an old sheet did not ask is at its default. */
export async function conventionsAt(
  workId: string,
  version: number,
  transaction?: Transaction,
): Promise<Conventions> {
  const sheet = await ConventionsSheet.findOne({
    where: { workId, version },
    rejectOnEmpty: true,
    transaction: transaction ?? null,
  });
  return { ...DEFAULT_CONVENTIONS, ...(sheet.choices as Partial<Conventions>) };
}
