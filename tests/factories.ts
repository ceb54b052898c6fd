import { randomBytes, randomUUID } from "node:crypto";
import type { CreationAttributes } from "sequelize";
import {
  Chapter,
  Claim,
  ClaimVersion,
  ConventionsSheet,
  Finding,
  Flag,
  Membership,
  Problem,
  Run,
  Session,
  Settlement,
  Source,
  User,
  Work,
} from "@/models";
import type { Role } from "@/lib/auth/permissions";
import type { SessionUser } from "@/lib/auth/user";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";

/** Each factory fills in what a test does not care about and gives the stored row. */

let last = 0;
const next = () => ++last;

export async function buildUser(given: Partial<CreationAttributes<User>> = {}): Promise<User> {
  const number = next();
  return User.create({
    email: `person-${number}-${randomUUID().slice(0, 8)}@example.org`,
    name: `Person ${number}`,
    ...given,
  });
}

export const buildAdmin = (given: Partial<CreationAttributes<User>> = {}) =>
  buildUser({ isAdmin: true, ...given });

/** The row as use cases receive it. */
export const asUser = (row: User): SessionUser => ({
  id: row.id,
  name: row.name,
  email: row.email,
  isAdmin: row.isAdmin,
  sessionId: randomUUID(),
});

/** A work with its first conventions sheet and a lead (a new person unless `createdById` is given). */
export async function buildWork(
  given: Partial<CreationAttributes<Work>> & { conventions?: Partial<typeof DEFAULT_CONVENTIONS> } = {},
): Promise<Work> {
  const { conventions, ...rest } = given;
  const createdById = rest.createdById ?? (await buildUser()).id;
  const work = await Work.create({ title: `Work ${next()}`, kind: "book", ...rest, createdById });
  await ConventionsSheet.create({
    workId: work.id,
    version: work.conventionsVersion,
    choices: { ...DEFAULT_CONVENTIONS, ...conventions },
    createdById,
  });
  await Membership.create({ workId: work.id, userId: createdById, role: "lead" });
  return work;
}

/** The lead that `buildWork` made. */
export async function leadOf(work: Work): Promise<SessionUser> {
  const row = await User.findByPk(work.createdById, { rejectOnEmpty: true });
  return asUser(row);
}

/** Somebody with a role on the work, as use cases receive them. */
export async function buildMember(
  work: Work,
  role: Role = "author",
  given: { user?: User; chapterIds?: string[] | null } = {},
): Promise<SessionUser> {
  const row = given.user ?? (await buildUser());
  await Membership.create({ workId: work.id, userId: row.id, role, chapterIds: given.chapterIds ?? null });
  return asUser(row);
}

export async function buildChapter(given: Partial<CreationAttributes<Chapter>> = {}): Promise<Chapter> {
  const workId = given.workId ?? (await buildWork()).id;
  const number = given.number ?? (await Chapter.count({ where: { workId } })) + 1;
  return Chapter.create({ title: `Chapter ${number}`, ...given, workId, number });
}

export async function buildProblem(given: Partial<CreationAttributes<Problem>> = {}): Promise<Problem> {
  const chapter = given.chapterId
    ? await Chapter.findByPk(given.chapterId, { rejectOnEmpty: true })
    : await buildChapter({ ...(given.workId && { workId: given.workId }) });
  const position = given.position ?? (await Problem.count({ where: { chapterId: chapter.id } })) + 1;
  return Problem.create({
    label: `${chapter.number}.${position}`,
    statement: "Evaluate the symbol.",
    ...given,
    position,
    chapterId: chapter.id,
    workId: chapter.workId,
  });
}

/** A right claim, unchecked, with its first version; `claimantId` is the work's creator unless given. */
export async function buildClaim(given: Partial<CreationAttributes<Claim>> = {}): Promise<Claim> {
  const problem = given.problemId
    ? await Problem.findByPk(given.problemId, { rejectOnEmpty: true })
    : await buildProblem({
        ...(given.workId && { workId: given.workId }),
        ...(given.chapterId && { chapterId: given.chapterId }),
      });
  const work = await Work.findByPk(problem.workId, { rejectOnEmpty: true });
  const number = next();
  const claim = await Claim.create({
    ref: `${problem.label}-${number}`,
    position: number,
    quantity: "(1 1 2; 0 0 0)",
    claimed: "sqrt(30)/15",
    claimantId: work.createdById,
    ...given,
    problemId: problem.id,
    chapterId: problem.chapterId,
    workId: problem.workId,
  });
  await ClaimVersion.bulkCreate(
    Array.from({ length: claim.current }, (_, i) => ({
      workId: claim.workId,
      claimId: claim.id,
      number: i + 1,
      quantity: claim.quantity,
      claimed: claim.claimed,
      note: claim.note ?? null,
      page: claim.page ?? null,
      authorId: claim.claimantId,
      origin: "typed" as const,
    })),
  );
  return claim;
}

/** An ended run of the whole work. */
export async function buildRun(given: Partial<CreationAttributes<Run>> & { workId: string }): Promise<Run> {
  const work = await Work.findByPk(given.workId, { rejectOnEmpty: true });
  return Run.create({
    startedById: work.createdById,
    state: "ended",
    conventionsVersion: work.conventionsVersion,
    engine: "test",
    total: 1,
    batches: 1,
    startedAt: new Date(),
    endedAt: new Date(),
    ...given,
  });
}

/** A judged finding on the current version of a claim; the claim carries its verdict, as after a run. */
export async function buildFinding(
  given: Partial<CreationAttributes<Finding>> & { claimId: string },
): Promise<Finding> {
  const claim = await Claim.findByPk(given.claimId, { rejectOnEmpty: true });
  const runId = given.runId ?? (await buildRun({ workId: claim.workId })).id;
  const verdict = given.verdict === undefined ? "discrepant" : given.verdict;
  const finding = await Finding.create({
    claimVersion: claim.current,
    batch: 0,
    exactText: "sqrt(30)/15",
    exactLatex: "\\frac{\\sqrt{30}}{15}",
    exactDecimal: "0.36514837167011074230",
    slips: [],
    reason: "The claimed value differs from the recomputed one.",
    details: {},
    evidence: {},
    judgedAt: verdict === null ? null : new Date(),
    ...given,
    verdict,
    runId,
    workId: claim.workId,
    chapterId: claim.chapterId,
  });
  await claim.update({ verdict: finding.verdict, findingId: finding.id });
  return finding;
}

/** An open flag with its finding. */
export async function buildFlag(
  given: Partial<CreationAttributes<Flag>> & { claimId: string },
): Promise<Flag> {
  const claim = await Claim.findByPk(given.claimId, { rejectOnEmpty: true });
  const finding = given.findingId
    ? await Finding.findByPk(given.findingId, { rejectOnEmpty: true })
    : await buildFinding({ claimId: claim.id });
  const state = given.state ?? "open";
  return Flag.create({
    claimVersion: finding.claimVersion,
    findingId: finding.id,
    runId: finding.runId,
    claimantId: claim.claimantId,
    ...given,
    state,
    openClaimId: state === "open" ? claim.id : null,
    workId: claim.workId,
    chapterId: claim.chapterId,
  });
}

/** A settlement in force, written straight into the tables (use lib/flags for the real thing). */
export async function buildSettlement(
  given: Partial<CreationAttributes<Settlement>> & { flagId: string; settlerId: string },
): Promise<Settlement> {
  const flag = await Flag.findByPk(given.flagId, { rejectOnEmpty: true });
  const claim = await Claim.findByPk(flag.claimId, { rejectOnEmpty: true });
  return Settlement.create({
    word: "stet",
    reason: "The book's own phase.",
    claimVersionBefore: flag.claimVersion,
    claimBefore: { quantity: claim.quantity, claimed: claim.claimed, withdrawn: claim.withdrawnAt !== null },
    claimantId: flag.claimantId,
    workId: flag.workId,
    activeFlagId: flag.id,
    ...given,
  });
}

export async function buildSource(given: Partial<CreationAttributes<Source>> = {}): Promise<Source> {
  const chapter = given.chapterId
    ? await Chapter.findByPk(given.chapterId, { rejectOnEmpty: true })
    : await buildChapter();
  const bytes = given.bytes ?? Buffer.from("ref,quantity,claimed\n");
  return Source.create({
    name: "key.csv",
    format: "csv",
    sha256: randomBytes(32).toString("hex"),
    uploadedById: (await Work.findByPk(chapter.workId, { rejectOnEmpty: true })).createdById,
    ...given,
    bytes,
    size: bytes.length,
    chapterId: chapter.id,
    workId: chapter.workId,
  });
}

/** A session row in force for a person, with the hash of a token that nobody has. */
export const buildSession = (userId: string, given: Partial<CreationAttributes<Session>> = {}) =>
  Session.create({
    userId,
    tokenHash: randomBytes(32).toString("hex"),
    lastUsedAt: new Date(),
    expiresAt: new Date(Date.now() + 3_600_000),
    ...given,
  });
