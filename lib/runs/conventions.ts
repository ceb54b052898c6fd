import type { Transaction } from "sequelize";
import { z } from "zod";
import { ConventionsSheet } from "@/models";
import { DEFAULT_CONVENTIONS, type Conventions } from "@/lib/verify/conventions";

const Choices = z.object({
  cgOrder: z.enum(["j1m1j2m2", "j1j2m1m2"]),
  phase: z.literal("condon-shortley"),
  houseForm: z.enum(["rationalised", "single-root", "root-below", "signed-square", "any"]),
  impliedRoot: z.boolean(),
  decimalMark: z.enum([".", ","]),
});

/** The choices of one version of a work's conventions sheet; a choice that the sheet does not make is the default. */
export async function conventionsOf(
  workId: string,
  version: number,
  transaction?: Transaction,
): Promise<Conventions> {
  const sheet = await ConventionsSheet.findOne({
    where: { workId, version },
    transaction: transaction ?? null,
    rejectOnEmpty: true,
  });
  return Choices.parse({ ...DEFAULT_CONVENTIONS, ...(sheet.choices as Partial<Conventions>) });
}
