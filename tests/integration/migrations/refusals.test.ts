import { createHash } from "node:crypto";
import { createConnection, type Connection } from "mariadb";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import {
  buildClaim,
  buildFinding,
  buildFlag,
  buildMember,
  buildSettlement,
  buildUser,
  buildWork,
} from "../../factories";
import { audit } from "@/lib/audit";
import { env } from "@/lib/env";
import {
  AuditEvent,
  Claim,
  ClaimVersion,
  Flag,
  FrozenKey,
  Membership,
  Problem,
  Settlement,
  Work,
  sequelize,
} from "@/models";

/** Straight to the database, past the models: what it refuses holds whatever the program does. */
let connection: Connection;
beforeAll(async () => {
  const { hostname, port, username, password, pathname } = new URL(env.DATABASE_URL);
  connection = await createConnection({
    host: hostname,
    port: Number(port),
    user: username,
    password,
    database: pathname.slice(1),
  });
});
afterAll(async () => {
  await connection.end();
  await sequelize.close();
});

async function freeze(work: Work): Promise<FrozenKey> {
  const canonicalJson = '{"claims":[]}';
  return FrozenKey.create({
    workId: work.id,
    number: 1,
    canonicalJson,
    sha256: createHash("sha256").update(canonicalJson).digest("hex"),
    claims: 0,
    frozenById: work.createdById,
  });
}

describe("a frozen key", () => {
  it("is neither changed nor deleted, by the models or past them", async () => {
    const key = await freeze(await buildWork());
    await expect(key.update({ claims: 7 })).rejects.toThrow(/never changed/);
    await expect(
      connection.query("update frozen_keys set claims = 7 where id = ?", [key.id]),
    ).rejects.toThrow(/never changed/);
    await expect(connection.query("delete from frozen_keys where id = ?", [key.id])).rejects.toThrow(
      /never deleted/,
    );
    expect(await FrozenKey.findByPk(key.id)).toMatchObject({ claims: 0 });
  });

  it("has the hash of its own text, and a number of its own", async () => {
    const work = await buildWork();
    const facts = { workId: work.id, claims: 0, frozenById: work.createdById };
    await expect(
      FrozenKey.create({ ...facts, number: 1, canonicalJson: "{}", sha256: "0".repeat(64) }),
    ).rejects.toThrow(/frozen_keys_hash_true/);
    const key = await freeze(work);
    await expect(
      FrozenKey.create({ ...facts, number: 1, canonicalJson: key.canonicalJson, sha256: key.sha256 }),
    ).rejects.toMatchObject({ name: "SequelizeUniqueConstraintError" });
  });
});

it("keeps the record of what happened as it was written", async () => {
  const work = await buildWork();
  await sequelize.transaction((transaction) =>
    audit(transaction, {
      workId: work.id,
      actorId: work.createdById,
      action: "sample.do",
      subjectType: "work",
      subjectId: work.id,
      after: { exact: "0.123456789012345678901234567890", count: 2 },
    }),
  );
  const [event] = await AuditEvent.findAll({ where: { workId: work.id } });
  expect(event).toMatchObject({
    after: { exact: "0.123456789012345678901234567890", count: 2 },
    before: null,
  });
  await expect(
    connection.query("update audit_events set action = 'x' where id = ?", [event?.id]),
  ).rejects.toThrow(/never rewritten/);
  await expect(connection.query("delete from audit_events where id = ?", [event?.id])).rejects.toThrow(
    /never deleted/,
  );
});

it("never changes what was once claimed", async () => {
  const claim = await buildClaim();
  await expect(ClaimVersion.update({ claimed: "0" }, { where: { claimId: claim.id } })).rejects.toThrow(
    /never changed/,
  );
});

describe("flags and settlements", () => {
  it("has one open flag a claim, and another once that is settled", async () => {
    const claim = await buildClaim();
    const first = await buildFlag({ claimId: claim.id });
    await expect(buildFlag({ claimId: claim.id })).rejects.toMatchObject({
      name: "SequelizeUniqueConstraintError",
    });
    await first.update({ state: "settled", openClaimId: null });
    expect(await buildFlag({ claimId: claim.id })).toMatchObject({ state: "open" });
    expect(await Flag.count({ where: { claimId: claim.id } })).toBe(2);
  });

  it("marks open flags as open and no others", async () => {
    const flag = await buildFlag({ claimId: (await buildClaim()).id });
    await expect(flag.update({ state: "settled" })).rejects.toThrow(/flags_open_marked/);
    await flag.reload();
    await expect(flag.update({ openClaimId: null })).rejects.toThrow(/flags_open_marked/);
  });

  it("is never assigned to, nor settled by, the claimant", async () => {
    const claim = await buildClaim();
    await expect(buildFlag({ claimId: claim.id, assigneeId: claim.claimantId })).rejects.toThrow(
      /flags_for_somebody_else/,
    );
    const flag = await buildFlag({ claimId: claim.id });
    await expect(buildSettlement({ flagId: flag.id, settlerId: claim.claimantId })).rejects.toThrow(
      /settlements_by_somebody_else/,
    );
  });

  it("takes nobody else's word for who the claimant is", async () => {
    const claim = await buildClaim();
    const flag = await buildFlag({ claimId: claim.id });
    const stranger = await buildUser();
    await expect(
      buildSettlement({ flagId: flag.id, settlerId: claim.claimantId, claimantId: stranger.id }),
    ).rejects.toMatchObject({ name: "SequelizeForeignKeyConstraintError" });
  });

  it("has one settlement in force a flag", async () => {
    const work = await buildWork();
    const second = await buildMember(work, "author");
    const flag = await buildFlag({ claimId: (await buildClaim({ workId: work.id })).id });
    const settlement = await buildSettlement({ flagId: flag.id, settlerId: second.id });
    await expect(buildSettlement({ flagId: flag.id, settlerId: second.id })).rejects.toMatchObject({
      name: "SequelizeUniqueConstraintError",
    });
    await settlement.update({ activeFlagId: null, undoneAt: new Date(), undoneById: second.id });
    expect(await buildSettlement({ flagId: flag.id, settlerId: second.id })).toBeTruthy();
    expect(await Settlement.count({ where: { flagId: flag.id } })).toBe(2);
  });

  it("wants a reason for stet and reword", async () => {
    const work = await buildWork();
    const second = await buildMember(work, "author");
    const flag = await buildFlag({ claimId: (await buildClaim({ workId: work.id })).id });
    for (const reason of [null, "", "   "])
      await expect(buildSettlement({ flagId: flag.id, settlerId: second.id, reason })).rejects.toThrow(
        /settlements_reasoned/,
      );
  });
});

describe("the tables", () => {
  it("know their words", async () => {
    const claim = await buildClaim();
    const set = (table: string, column: string, id: string) =>
      connection.query(`update ${table} set ${column} = 'something' where id = ?`, [id]);
    await expect(set("claims", "verdict", claim.id)).rejects.toThrow(/claims_verdict_known/);
    await expect(set("works", "kind", claim.workId)).rejects.toThrow(/works_kind_known/);
    const member = await Membership.findOne({ where: { workId: claim.workId }, rejectOnEmpty: true });
    await expect(set("memberships", "role", member.id)).rejects.toThrow(/memberships_role_known/);
  });

  it("put no claim under a problem of another work or chapter", async () => {
    const claim = await buildClaim();
    const other = await Problem.findByPk((await buildClaim()).problemId, { rejectOnEmpty: true });
    await expect(claim.update({ problemId: other.id })).rejects.toMatchObject({
      name: "SequelizeForeignKeyConstraintError",
    });
  });

  it("have one finding a claim in a run, one role a person, one ref a claim", async () => {
    const claim = await buildClaim();
    const finding = await buildFinding({ claimId: claim.id });
    await expect(buildFinding({ claimId: claim.id, runId: finding.runId })).rejects.toMatchObject({
      name: "SequelizeUniqueConstraintError",
    });
    const work = await Work.findByPk(claim.workId, { rejectOnEmpty: true });
    await expect(
      Membership.create({ workId: work.id, userId: work.createdById, role: "author" }),
    ).rejects.toMatchObject({ name: "SequelizeUniqueConstraintError" });
    await expect(buildClaim({ problemId: claim.problemId, ref: claim.ref })).rejects.toMatchObject({
      name: "SequelizeUniqueConstraintError",
    });
    expect(await buildClaim({ problemId: claim.problemId, ref: claim.ref.toUpperCase() + "A" })).toBeTruthy();
  });

  it("give texts back as they came, digit for digit", async () => {
    const claimed = "0.1234567890123456789012345678901234567890123456789 − ½√3 ⟨π⟩";
    const { id } = await buildClaim({ claimed });
    expect((await Claim.findByPk(id, { rejectOnEmpty: true })).claimed).toBe(claimed);
  });

  it("take no bad verdict on a finding that was not judged", async () => {
    const finding = await buildFinding({ claimId: (await buildClaim()).id });
    await expect(
      connection.query("update findings set judged_at = null where id = ?", [finding.id]),
    ).rejects.toThrow(/findings_judged_whole/);
  });
});
