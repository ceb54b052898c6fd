import { Op } from "sequelize";

import { gate, visibleChapters, type Access } from "@/lib/auth/gate";
import { can } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { notFound } from "@/lib/errors";
import { isId } from "@/lib/ids";
import { readDetails, readSlips } from "@/lib/flags/finding-details";
import { flagHistory } from "@/lib/flags/flag-history";
import type { FlagQuery } from "@/lib/flags/flag-query";
import { flagNeighbours } from "@/lib/flags/flag-neighbours";
import { orbitClaims } from "@/lib/flags/orbit-claims";
import { proofOf } from "@/lib/flags/proof";
import { isReal } from "@/lib/symbols/exact";
import { toDecimal } from "@/lib/symbols/exact-print";
import type { Conventions } from "@/lib/verify/conventions";
import { readValue } from "@/lib/verify/read-value";
import { conventionsAt } from "@/lib/works/conventions-at";
import {
  Chapter,
  Claim,
  Finding,
  Flag,
  FrozenKey,
  Membership,
  Message,
  Problem,
  Run,
  Settlement,
  Source,
  ClaimVersion,
  User,
} from "@/models";

type Loaded = Flag & {
  chapter: Chapter;
  claim: Claim;
  finding: Finding;
  claimant: User;
  assignee: User | null;
};

/**
 * Everything that the page of one flag shows.
 * @throws AppError not_found outside the work, or outside the chapters that this person may see
 */
export async function getFlag(workId: string, flagId: string, query: FlagQuery, user: SessionUser) {
  const access = await gate(user, "flag.read", workId);
  if (!isId(flagId)) throw notFound();
  const flag = (await Flag.findOne({
    where: { id: flagId, workId, ...visibleChapters(access) },
    include: [
      { model: Chapter, as: "chapter", required: true },
      { model: Claim, as: "claim", required: true },
      { model: Finding, as: "finding", required: true },
      { model: User, as: "claimant", attributes: ["id", "name"], required: true },
      { model: User, as: "assignee", attributes: ["id", "name"], required: false },
    ],
  })) as Loaded | null;
  if (!flag) throw notFound();
  const { claim, chapter, finding, claimant, assignee } = flag;
  const [problem, run, judged, settlement, messages, history, neighbours] = await Promise.all([
    Problem.findByPk(claim.problemId, { rejectOnEmpty: true }),
    Run.findByPk(flag.runId, {
      attributes: ["conventionsVersion", "engine", "endedAt"],
      rejectOnEmpty: true,
    }),
    ClaimVersion.findOne({ where: { claimId: claim.id, number: flag.claimVersion } }),
    currentSettlement(flag.id),
    discussion(flag.id),
    flagHistory(flag.id),
    flagNeighbours(workId, flag.id, query, access),
  ]);
  const conventions = await conventionsAt(workId, run.conventionsVersion);
  const details = readDetails(finding.details);
  const quantity = judged?.quantity ?? claim.quantity;
  const proof = proofOf(quantity, conventions, finding.evidence);
  const { may, whyNot } = permits(access, user, flag, settlement);
  return {
    id: flag.id,
    version: flag.version,
    state: flag.state,
    raisedAt: flag.createdAt.toISOString(),
    work: { id: access.work.id, title: access.work.title },
    chapter: { id: chapter.id, number: chapter.number, title: chapter.title },
    problem: { label: problem.label, statement: problem.statement },
    claim: {
      id: claim.id,
      ref: claim.ref,
      note: claim.note,
      page: claim.page,
    },
    verdict: finding.verdict as "discrepant" | "contradicted" | "unreadable",
    reason: finding.reason ?? "",
    quantity: { text: quantity, latex: details.reading?.quantityLatex ?? proof?.latex ?? null },
    claimed: valueOf(judged?.claimed ?? claim.claimed, conventions),
    exact:
      finding.exactText === null
        ? null
        : {
            text: finding.exactText,
            latex: finding.exactLatex ?? finding.exactText,
            decimal: finding.exactDecimal ?? "",
          },
    houseForm: details.houseForm,
    errors: details.errors,
    zero: details.zero,
    slips: readSlips(finding.slips),
    proof,
    orbit: await orbitClaims(claim, access, conventions),
    place: await sourcePlace(judged?.sourceId ?? null, details.place),
    claimant: { id: claimant.id, name: claimant.name },
    assignee: assignee ? { id: assignee.id, name: assignee.name } : null,
    settlement: settlement && {
      ...settlement,
      now: settlement.word === "correct" ? valueOf(claim.claimed, conventions) : null,
    },
    messages,
    history,
    neighbours,
    may,
    whyNot,
    people: may.assign ? await assignable(workId, chapter.id, claimant.id) : [],
  };
}
export type FlagView = Awaited<ReturnType<typeof getFlag>>;

/** A typed value with its printed form and, to compare it at a glance, its first digits; null where it cannot be read. */
function valueOf(text: string, conventions: Conventions) {
  const read = readValue(text, conventions);
  if (!read.ok) return { text, latex: null, decimal: null };
  const { exact } = read.value;
  return { text, latex: read.latex, decimal: isReal(exact) ? toDecimal(exact, 20) : null };
}

/** What this person may do with the flag, and in one sentence why they may not settle it. */
function permits(
  access: Access,
  user: SessionUser,
  flag: Flag,
  settlement: Awaited<ReturnType<typeof currentSettlement>>,
) {
  const person = { userId: user.id, isAdmin: user.isAdmin, role: access.role, chapterIds: access.chapterIds };
  const subject = { chapterId: flag.chapterId, claimantId: flag.claimantId, assigneeId: flag.assigneeId };
  const open = flag.state === "open";
  const own = flag.claimantId === user.id;
  const may = {
    settle: open && can(person, "flag.settle", subject),
    discuss: can(person, "flag.discuss", subject),
    assign: open && can(person, "flag.assign", subject),
    take:
      open &&
      !own &&
      flag.assigneeId !== user.id &&
      access.role !== "referee" &&
      can(person, "flag.settle", subject),
    undo:
      flag.state === "settled" &&
      settlement !== null &&
      settlement.frozenIn === null &&
      can(person, "settlement.undo", { ...subject, settlerId: settlement.by.id }),
  };
  const whyNot =
    !open || may.settle
      ? null
      : own
        ? "This is your own claim, so a second author settles it. You can say in the discussion what you meant."
        : "This flag is assigned to somebody else. A referee settles only the flags that are assigned to them.";
  return { may, whyNot };
}

async function currentSettlement(flagId: string) {
  const settlement = await Settlement.findOne({
    where: { activeFlagId: flagId },
    include: [{ model: User, as: "settler", attributes: ["id", "name"], required: true }],
  });
  if (!settlement) return null;
  const { settler } = settlement as Settlement & { settler: User };
  return {
    word: settlement.word,
    reason: settlement.reason,
    convention: settlement.convention,
    by: { id: settler.id, name: settler.name },
    at: settlement.createdAt.toISOString(),
    before: settlement.claimBefore.claimed,
    frozenIn: await frozenAfter(settlement),
  };
}

/** The number of the first key frozen after this settlement, which then stands for good; null while there is none. */
async function frozenAfter({
  workId,
  createdAt,
}: Pick<Settlement, "workId" | "createdAt">): Promise<number | null> {
  const key = await FrozenKey.findOne({
    attributes: ["number"],
    where: { workId, createdAt: { [Op.gte]: createdAt } },
    order: [["number", "ASC"]],
  });
  return key?.number ?? null;
}

async function discussion(flagId: string) {
  const messages = await Message.findAll({
    where: { flagId },
    include: [{ model: User, as: "author", attributes: ["id", "name"], required: true }],
    order: [
      ["createdAt", "ASC"],
      ["id", "ASC"],
    ],
    limit: 500,
  });
  return messages.map((message) => {
    const { author } = message as Message & { author: User };
    return { id: message.id, body: message.body, at: message.createdAt.toISOString(), author: author.name };
  });
}

/** Where the claim stands in the file it came from. */
async function sourcePlace(sourceId: string | null, place: { line: number; column: number } | null) {
  if (!sourceId) return null;
  const source = await Source.findByPk(sourceId, { attributes: ["id", "name"] });
  return source ? { sourceId: source.id, name: source.name, line: place?.line ?? null } : null;
}

/** Who could settle a flag of this chapter: everybody but the claimant who may read it. */
async function assignable(workId: string, chapterId: string, claimantId: string) {
  const members = await Membership.findAll({
    where: { workId, role: ["lead", "author", "referee"], userId: { [Op.ne]: claimantId } },
    include: [
      { model: User, as: "user", attributes: ["id", "name"], where: { disabledAt: null }, required: true },
    ],
    order: [["user", "name", "ASC"]],
  });
  return members
    .filter(
      ({ role, chapterIds }) => role !== "referee" || chapterIds === null || chapterIds.includes(chapterId),
    )
    .map((member) => {
      const { id, name } = (member as Membership & { user: User }).user;
      return { id, name, role: member.role };
    });
}
