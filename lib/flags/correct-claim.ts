import type { Transaction } from "sequelize";

import { AppError } from "@/lib/errors";
import { conventionsAt } from "@/lib/works/conventions-at";
import { verifyClaim } from "@/lib/verify/verify-claim";
import { Claim, ClaimVersion, Finding, type Flag, type Work } from "@/models";

/** The recomputed value, printed as the house prints it, and seen to be confirmed when it is read again. */
export type Correction = { claimed: string };

/**
 * What "correct" would put in the place of the claimed value.
 * @throws AppError invalid when nothing could be recomputed; conflict when the conventions sheet has changed the value
 *   since the run
 */
export async function correctionFor(
  claim: Claim,
  flag: Flag,
  work: Pick<Work, "id" | "conventionsVersion">,
  transaction: Transaction,
): Promise<Correction> {
  const conventions = await conventionsAt(work.id, work.conventionsVersion, transaction);
  const now = verifyClaim({ ref: claim.ref, quantity: claim.quantity, claimed: claim.claimed }, conventions);
  if (now.exact === null)
    throw new AppError(
      "invalid",
      "Nothing could be recomputed for this claim, so there is no value to take. Reword or withdraw it.",
      {
        fields: { word: ["There is no recomputed value to take"] },
      },
    );
  const judged = await Finding.findByPk(flag.findingId, {
    attributes: ["exactText"],
    rejectOnEmpty: true,
    transaction,
  });
  if (judged.exactText !== null && judged.exactText !== now.exact.text)
    throw new AppError(
      "conflict",
      "The conventions sheet was changed since this run. Start a new run, then settle what it finds.",
    );
  const claimed = now.houseForm?.text ?? now.exact.text;
  const again = verifyClaim({ ref: claim.ref, quantity: claim.quantity, claimed }, conventions);
  if (again.verdict !== "confirmed")
    throw new Error(`The corrected value ${claimed} of ${claim.quantity} is read back as ${again.verdict}.`);
  return { claimed };
}

/** Gives the claim its next version. Versions are never changed; the claimant stays who they were. */
export async function addVersion(
  claim: Claim,
  next: { claimed: string; authorId: string; origin: "corrected" | "undone" },
  transaction: Transaction,
): Promise<number> {
  const number = claim.current + 1;
  const { id: claimId, workId, quantity, note, page } = claim;
  const { claimed, authorId, origin } = next;
  await ClaimVersion.create(
    { workId, claimId, number, quantity, claimed, note, page, authorId, origin },
    { transaction },
  );
  return number;
}
