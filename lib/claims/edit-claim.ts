import { Op, type Transaction } from "sequelize";
import { audit } from "@/lib/audit";
import type { SessionUser } from "@/lib/auth/user";
import { isDuplicate } from "@/lib/errors";
import { conventionsAt } from "@/lib/works/conventions-at";
import { transact } from "@/lib/transact";
import { Claim, ClaimVersion, Flag, Settlement } from "@/models";
import { refTaken } from "./add-claim";
import { findClaim, lockClaim, staleClaim } from "./find-claim";
import { orbitKeyOf } from "./reading";
import type { ClaimText, EditClaim } from "./schema";
import { supersedeFlags } from "./supersede-flag";

export type Edited = {
  id: string;
  version: number;
  /** "version": a new version waits for a run; "ref": only the reference changed; "nothing": all was as it is */
  change: "version" | "ref" | "nothing";
};

/**
 * Changes a claim. Its old text stays in its history; the new version is unchecked until a run, an open flag on the
 * old one is closed, and the person who edits becomes the claimant. Saving the same text once more makes a new version
 * only where a settling asked for one (reword).
 * @throws AppError not_found; forbidden; conflict with details.stored; invalid with fields.ref
 */
export async function editClaim(input: EditClaim, user: SessionUser): Promise<Edited> {
  await findClaim(input.workId, input.claimId, user);
  return transact(async (transaction) => {
    const { claim, access } = await lockClaim(input.workId, input.claimId, user, transaction);
    const same = sameText(claim, input);
    // A second press of the same button: it is saved already.
    if (claim.version !== input.version && same && claim.ref === input.ref && claim.claimantId === user.id)
      return { id: claim.id, version: claim.version, change: "nothing" };
    if (claim.version !== input.version) throw await staleClaim(claim, transaction);
    if (claim.ref !== input.ref) await refuseTaken(claim, input.ref, transaction);

    const before = {
      ref: claim.ref,
      quantity: claim.quantity,
      claimed: claim.claimed,
      note: claim.note,
      page: claim.page,
    };
    const again = same && (await wantsAnotherVersion(claim, transaction));
    if (same && !again && claim.ref === input.ref)
      return { id: claim.id, version: claim.version, change: "nothing" };
    const change = !same || again ? "version" : "ref";
    if (change === "version") {
      const conventions = await conventionsAt(claim.workId, access.work.conventionsVersion, transaction);
      await nextVersion(claim, input, { authorId: user.id, origin: "typed" }, transaction);
      claim.set({ claimantId: user.id, orbitKey: orbitKeyOf(input.quantity, conventions) });
    }
    claim.set({ ref: input.ref });
    await claim.save({ transaction }).catch((error: unknown) => {
      throw isDuplicate(error) ? refTaken(input.ref) : error;
    });
    if (change === "version") await supersedeFlags([claim.id], user.id, transaction);
    await audit(transaction, {
      workId: claim.workId,
      actorId: user.id,
      action: "claim.edit",
      subjectType: "claim",
      subjectId: claim.id,
      before,
      after: {
        ref: input.ref,
        quantity: input.quantity,
        claimed: input.claimed,
        note: input.note,
        page: input.page,
      },
    });
    return { id: claim.id, version: claim.version, change };
  });
}

const sameText = (claim: Claim, text: ClaimText) =>
  claim.quantity === text.quantity &&
  claim.claimed === text.claimed &&
  claim.note === text.note &&
  claim.page === text.page;

async function refuseTaken(claim: Claim, ref: string, transaction: Transaction): Promise<void> {
  const other = await Claim.findOne({
    attributes: ["id"],
    where: { workId: claim.workId, ref, id: { [Op.ne]: claim.id } },
    transaction,
  });
  if (other) throw refTaken(ref);
}

/** Writes the next version and makes it current, unchecked; the caller saves the claim. */
export async function nextVersion(
  claim: Claim,
  text: Pick<ClaimText, "quantity" | "claimed" | "note" | "page">,
  how: { authorId: string; origin: "typed" | "restored"; sourceId?: string },
  transaction: Transaction,
): Promise<void> {
  const { quantity, claimed, note, page } = text;
  const number = claim.current + 1;
  await ClaimVersion.create(
    { workId: claim.workId, claimId: claim.id, number, quantity, claimed, note, page, ...how },
    { transaction },
  );
  claim.set({ current: number, quantity, claimed, note, page, verdict: null, findingId: null });
}

/** Whether a settling asked the claimant to save the claim again after changing the problem. */
async function wantsAnotherVersion(claim: Claim, transaction: Transaction): Promise<boolean> {
  const reworded = await Settlement.findOne({
    attributes: ["id"],
    where: {
      workId: claim.workId,
      word: "reword",
      undoneAt: null,
      claimVersionBefore: claim.current,
      flagId: await flagsOf(claim, transaction),
    },
    transaction,
  });
  return reworded !== null;
}

const flagsOf = async (claim: Claim, transaction: Transaction): Promise<string[]> =>
  (await Flag.findAll({ attributes: ["id"], where: { claimId: claim.id }, transaction })).map(({ id }) => id);
