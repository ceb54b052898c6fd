import { Op } from "sequelize";
import type { Role } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { Chapter, Claim, Flag, FrozenKey, Membership, Work } from "@/models";
import type { Verdict } from "@/models/finding";
import { countOpenFlags, countVerdicts, type VerdictCounts } from "./counts";

const SHOWN = 12;
const WRONG = ["discrepant", "contradicted", "unreadable", "undecided"] as const satisfies readonly Verdict[];

export type Desk = {
  /** open flags assigned to this person, oldest first */
  flags: {
    total: number;
    rows: {
      id: string;
      workId: string;
      work: string;
      chapter: string;
      ref: string;
      verdict: Verdict | null;
      since: string;
    }[];
  };
  /** this person's own claims that came back wrong */
  returned: {
    total: number;
    rows: { id: string; workId: string; work: string; ref: string; verdict: Verdict | null }[];
  };
  works: DeskWork[];
};

export type DeskWork = {
  id: string;
  title: string;
  kind: Work["kind"];
  confidential: boolean;
  role: Role;
  /** null for production, which sees no drafts */
  counts: VerdictCounts | null;
  openFlags: number | null;
  lastKey: number | null;
};

/** What waits for this person, most urgent first, and the works they belong to. Nothing of any other work. */
export async function getDesk(user: SessionUser): Promise<Desk> {
  const members = await Membership.findAll({
    where: { userId: user.id },
    include: [{ model: Work, as: "work", required: true }],
  });
  const works = new Map(
    (members as (Membership & { work: Work })[]).map((member) => [member.workId, member]),
  );
  const reading = [...works.values()].filter(({ role }) => role !== "production").map(({ workId }) => workId);
  const [flags, returned, list] = await Promise.all([
    flagsFor(user.id, reading, works),
    returnedTo(user.id, works),
    listWorks([...works.values()]),
  ]);
  return { flags, returned, works: list };
}

type Member = Membership & { work: Work };
type Works = ReadonlyMap<string, Member>;

async function flagsFor(userId: string, workIds: string[], works: Works): Promise<Desk["flags"]> {
  const where = { assigneeId: userId, state: "open" as const, workId: { [Op.in]: workIds } };
  const [total, rows] = await Promise.all([
    Flag.count({ where }),
    Flag.findAll({
      where,
      include: [
        { model: Claim, as: "claim", attributes: ["ref", "verdict"], required: true },
        { model: Chapter, as: "chapter", attributes: ["number"], required: true },
      ],
      order: [["createdAt", "ASC"]],
      limit: SHOWN,
    }),
  ]);
  return {
    total,
    rows: (rows as (Flag & { claim: Claim; chapter: Chapter })[]).map((flag) => ({
      id: flag.id,
      workId: flag.workId,
      work: works.get(flag.workId)?.work.title ?? "",
      chapter: String(flag.chapter.number),
      ref: flag.claim.ref,
      verdict: flag.claim.verdict,
      since: flag.createdAt.toISOString(),
    })),
  };
}

/** Only where they may still write: somebody who lost that role has nothing to mend there. */
async function returnedTo(userId: string, works: Works): Promise<Desk["returned"]> {
  const writing = [...works.values()].filter(({ role }) => role === "lead" || role === "author");
  const where = {
    claimantId: userId,
    verdict: { [Op.in]: [...WRONG] },
    withdrawnAt: null,
    workId: { [Op.in]: writing.map(({ workId }) => workId) },
  };
  const [total, rows] = await Promise.all([
    Claim.count({ where }),
    Claim.findAll({
      where,
      attributes: ["id", "workId", "ref", "verdict"],
      order: [["updatedAt", "DESC"]],
      limit: SHOWN,
    }),
  ]);
  return {
    total,
    rows: rows.map(({ id, workId, ref, verdict }) => ({
      id,
      workId,
      work: works.get(workId)?.work.title ?? "",
      ref,
      verdict,
    })),
  };
}

async function listWorks(members: readonly Member[]): Promise<DeskWork[]> {
  const whole = members.filter(({ role, chapterIds }) => role !== "production" && chapterIds === null);
  const ids = whole.map(({ workId }) => workId);
  const held = members.filter(({ role, chapterIds }) => role === "referee" && chapterIds !== null);
  const chapterIds = held.flatMap((member) => member.chapterIds ?? []);
  const [counts, flags, partCounts, partFlags, keys] = await Promise.all([
    countVerdicts("workId", { workId: { [Op.in]: ids } }),
    countOpenFlags("workId", { workId: { [Op.in]: ids } }),
    countVerdicts("workId", { chapterId: { [Op.in]: chapterIds } }),
    countOpenFlags("workId", { chapterId: { [Op.in]: chapterIds } }),
    FrozenKey.findAll({
      where: { workId: members.filter(({ role }) => role !== "referee").map(({ workId }) => workId) },
      attributes: ["workId", "number"],
      order: [["number", "ASC"]],
    }),
  ]);
  const lastKey = new Map(keys.map(({ workId, number }) => [workId, number]));
  return members
    .map(({ workId, role, work }) => ({
      id: workId,
      title: work.title,
      kind: work.kind,
      confidential: work.confidential,
      role,
      counts:
        role === "production"
          ? null
          : (counts.get(workId) ?? partCounts.get(workId) ?? { unchecked: 0, total: 0 }),
      openFlags: role === "production" ? null : (flags.get(workId) ?? partFlags.get(workId) ?? 0),
      lastKey: lastKey.get(workId) ?? null,
    }))
    .sort((a, b) => a.title.localeCompare(b.title));
}
