import { Op, type Transaction } from "sequelize";

import { Chapter, Claim, Flag, Problem, Run, Settlement, User, Waiver, Finding } from "@/models";

export type OpenFlag = { id: string; assignee: string | null };
export type InForce = { settlement: Settlement; by: string };

/** A claim of the work with what a key has to know about it. */
export type ClaimState = {
  claim: Claim;
  chapter: { id: string; number: number; title: string };
  problem: { id: string; label: string };
  claimant: string;
  /** the conventions sheet that its verdict was found under; null for one that settling gave */
  judgedUnder: number | null;
  openFlag: OpenFlag | null;
  /** settlements in force, the latest first */
  settlements: InForce[];
  waiver: { row: Waiver; by: string } | null;
};

type Loaded = Claim & {
  chapter: Chapter;
  problem: Problem;
  claimant: User;
  finding: (Finding & { runId: string }) | null;
};

/**
 * Every claim of a work, in the order of print, with its flags, settlements and waiver.
 * @param lock locks the claims, in the order of their ids, before anything about them is read
 */
export async function loadClaimStates(
  workId: string,
  transaction?: Transaction,
  lock = false,
): Promise<ClaimState[]> {
  const inside = { transaction: transaction ?? null };
  if (lock && transaction)
    await Claim.findAll({
      attributes: ["id"],
      where: { workId },
      order: [["id", "ASC"]],
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
  const claims = (await Claim.findAll({
    where: { workId },
    include: [
      { model: Chapter, as: "chapter", attributes: ["id", "number", "title"], required: true },
      { model: Problem, as: "problem", attributes: ["id", "label", "position"], required: true },
      { model: User, as: "claimant", attributes: ["name"], required: true },
      { model: Finding, as: "finding", attributes: ["runId"], required: false },
    ],
    order: [
      ["chapter", "number", "ASC"],
      ["problem", "position", "ASC"],
      ["position", "ASC"],
      ["ref", "ASC"],
    ],
    ...inside,
  })) as Loaded[];
  const [runs, openFlags, settlements, waivers] = await Promise.all([
    Run.findAll({ attributes: ["id", "conventionsVersion"], where: { workId }, ...inside }),
    Flag.findAll({
      where: { workId, state: "open" },
      include: [{ model: User, as: "assignee", attributes: ["name"], required: false }],
      ...inside,
    }),
    settlementsInForce(workId, transaction),
    Waiver.findAll({ where: { workId }, ...inside }),
  ]);
  const names = await namesOf(
    waivers.map(({ namedById }) => namedById),
    transaction,
  );
  const under = new Map(runs.map(({ id, conventionsVersion }) => [id, conventionsVersion]));
  const flagOf = new Map(openFlags.map((flag) => [flag.claimId, flag as Flag & { assignee: User | null }]));
  return claims.map((claim) => {
    const flag = flagOf.get(claim.id);
    const waiver = waivers.find((row) => row.claimId === claim.id && row.claimVersion === claim.current);
    return {
      claim,
      chapter: { id: claim.chapter.id, number: claim.chapter.number, title: claim.chapter.title },
      problem: { id: claim.problem.id, label: claim.problem.label },
      claimant: claim.claimant.name,
      judgedUnder: claim.finding ? (under.get(claim.finding.runId) ?? null) : null,
      openFlag: flag ? { id: flag.id, assignee: flag.assignee?.name ?? null } : null,
      settlements: settlements.get(claim.id) ?? [],
      waiver: waiver ? { row: waiver, by: names.get(waiver.namedById) ?? "" } : null,
    };
  });
}

async function settlementsInForce(
  workId: string,
  transaction?: Transaction,
): Promise<Map<string, InForce[]>> {
  const inside = { transaction: transaction ?? null };
  const rows = await Settlement.findAll({
    where: { workId, activeFlagId: { [Op.not]: null } },
    include: [{ model: User, as: "settler", attributes: ["name"], required: true }],
    order: [["createdAt", "DESC"]],
    ...inside,
  });
  const flags = await Flag.findAll({
    attributes: ["id", "claimId"],
    where: { workId, state: "settled" },
    ...inside,
  });
  const claimOf = new Map(flags.map(({ id, claimId }) => [id, claimId]));
  const byClaim = new Map<string, InForce[]>();
  for (const settlement of rows) {
    const claimId = claimOf.get(settlement.flagId);
    if (!claimId) continue;
    const entry = { settlement, by: (settlement as Settlement & { settler: User }).settler.name };
    byClaim.set(claimId, [...(byClaim.get(claimId) ?? []), entry]);
  }
  return byClaim;
}

async function namesOf(ids: string[], transaction?: Transaction): Promise<Map<string, string>> {
  if (ids.length === 0) return new Map();
  const users = await User.findAll({
    attributes: ["id", "name"],
    where: { id: ids },
    transaction: transaction ?? null,
  });
  return new Map(users.map(({ id, name }) => [id, name]));
}

/** The settlement that speaks of the claim as it now stands. */
export function settledNow({
  claim,
  settlements,
}: Pick<ClaimState, "claim" | "settlements">): InForce | null {
  return (
    settlements.find(
      ({ settlement }) => (settlement.claimVersionAfter ?? settlement.claimVersionBefore) === claim.current,
    ) ?? null
  );
}
