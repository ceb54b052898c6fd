import { createHash } from "node:crypto";
import { createConnection } from "mariadb";
import { afterAll, beforeEach, describe, expect, it } from "vitest";

import { editClaim } from "@/lib/claims/edit-claim";
import { AppError } from "@/lib/errors";
import { settleFlag } from "@/lib/flags/settle-flag";
import { undoSettlement } from "@/lib/flags/undo-settlement";
import { freezeKey } from "@/lib/keys/freeze-key";
import { getKey } from "@/lib/keys/get-key";
import { canonicalJson, type KeyContent } from "@/lib/keys/key-content";
import { nameWaiver } from "@/lib/keys/name-waiver";
import { AuditEvent, Claim, FrozenKey, sequelize } from "@/models";
import { buildStage, buildWrong, settling, type Stage } from "../flags/stage";
import { buildJudged } from "./stage";

let stage: Stage;
beforeEach(async () => {
  stage = await buildStage();
});
afterAll(() => sequelize.close());

const freeze = (number = 1, user = stage.lead, confirmation = `key ${number}`) =>
  freezeKey({ workId: stage.work.id, number, confirmation }, user);

const codeOf = (promise: Promise<unknown>): Promise<string> =>
  promise.then(
    () => "ok",
    (error: unknown) => (error instanceof AppError ? error.code : `bug: ${String(error)}`),
  );

/** RFC 8785 for what a key holds (objects, lists, text, true, false, null), written apart from the product's way. */
function canonical(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonical).join(",")}]`;
  if (typeof value !== "object" || value === null) {
    if (typeof value === "number") throw new Error("a number");
    return JSON.stringify(value);
  }
  const names = Object.keys(value).sort((a, b) => {
    for (let i = 0; i < Math.min(a.length, b.length); i++)
      if (a.charCodeAt(i) !== b.charCodeAt(i)) return a.charCodeAt(i) - b.charCodeAt(i);
    return a.length - b.length;
  });
  return `{${names.map((name) => `${JSON.stringify(name)}:${canonical((value as Record<string, unknown>)[name])}`).join(",")}}`;
}

describe("freezing", () => {
  it("writes down every claim with what was settled by whom, hashed over its canonical JSON", async () => {
    const right = await buildJudged(stage, { ref: "1.1(a)" });
    const other = await buildJudged(stage, {
      ref: "1.1(b)",
      claimed: "sqrt(2/15)",
      verdict: "confirmed-not-house-form",
    });
    const stet = await buildWrong(stage);
    await settleFlag(settling(stet.flag, "stet", { reason: "Ünsere “Phase” — \u2028 stands" }), stage.second);
    const gone = await buildWrong(stage);
    await settleFlag(settling(gone.flag, "withdraw"), stage.second);
    const open = await buildJudged(stage, { verdict: "undecided", claimed: "1" });
    await nameWaiver(
      { workId: stage.work.id, claimId: open.id, claimVersion: 1, reason: "Checked by hand, twice." },
      stage.lead,
    );

    const { sha256 } = await freeze();
    const row = await FrozenKey.findOne({ where: { workId: stage.work.id }, rejectOnEmpty: true });
    expect(row).toMatchObject({ number: 1, sha256, claims: 4 });
    const content = JSON.parse(row.canonicalJson) as KeyContent;
    expect(canonical(content)).toBe(row.canonicalJson);
    expect(createHash("sha256").update(canonical(content)).digest("hex")).toBe(sha256);
    const claim = (id: string) => content.claims.find((each) => each.id === id);
    expect(claim(right.id)).toMatchObject({
      claimed: "sqrt(30)/15",
      answer: { text: "sqrt(30)/15" },
      value: { text: "sqrt(30)/15", decimal: "0.36514837167011074230" },
      settlement: null,
      waiver: null,
    });
    expect(claim(other.id)).toMatchObject({ claimed: "sqrt(2/15)", answer: { text: "sqrt(30)/15" } });
    expect(claim(stet.claim.id)).toMatchObject({
      answer: { text: "sqrt(2)/15" },
      value: { text: "sqrt(30)/15" },
      settlement: { word: "stet", by: stage.second.name, convention: "symbols without the phase, table A.4" },
    });
    expect(claim(open.id)).toMatchObject({
      verdict: "undecided",
      waiver: { by: stage.lead.name, reason: "Checked by hand, twice." },
    });
    expect(content.withdrawn).toMatchObject([
      { ref: gone.claim.ref, settlement: { word: "withdraw", by: stage.second.name } },
    ]);
    expect(content).toMatchObject({
      number: "1",
      previous: null,
      frozenBy: stage.lead.name,
      conventionsVersion: "1",
    });
    const event = await AuditEvent.findOne({
      where: { action: "key.freeze", workId: stage.work.id },
      rejectOnEmpty: true,
    });
    expect(event.after).toMatchObject({ number: 1, sha256, claims: 4 });
  });

  it("is for a lead who types the key's name", async () => {
    await buildJudged(stage);
    expect(await codeOf(freeze(1, stage.second))).toBe("forbidden");
    expect(await codeOf(freeze(1, stage.referee))).toBe("forbidden");
    expect(await codeOf(freeze(1, stage.production))).toBe("forbidden");
    expect(await codeOf(freeze(1, stage.stranger))).toBe("not_found");
    expect(await codeOf(freeze(1, stage.lead, "key 2"))).toBe("invalid");
    expect(await codeOf(freeze(1, stage.lead, ""))).toBe("invalid");
    expect(await codeOf(freeze(2))).toBe("conflict");
    expect(await FrozenKey.count({ where: { workId: stage.work.id } })).toBe(0);
    expect(await codeOf(freeze(1, stage.lead, " Key 1 ".trim()))).toBe("ok");
  });

  it("is refused while anything hinders it", async () => {
    expect(await codeOf(freeze())).toBe("conflict");
    await buildJudged(stage);
    await buildWrong(stage);
    expect(await codeOf(freeze())).toBe("conflict");
    expect(await FrozenKey.count({ where: { workId: stage.work.id } })).toBe(0);
  });

  it("believes no stored verdict: a claim that is wrong when it is recomputed stops the key, by its ref", async () => {
    await buildJudged(stage, { ref: "9.9(z)", claimed: "1/2", verdict: "confirmed" });
    const error = await freeze().catch((thrown: unknown) => thrown);
    expect(error).toMatchObject({ code: "conflict", details: { refs: ["9.9(z)"] } });
    expect(await FrozenKey.count({ where: { workId: stage.work.id } })).toBe(0);
  });

  it("eight leads at once freeze one key", async () => {
    await buildJudged(stage);
    const codes = await Promise.all(Array.from({ length: 8 }, () => codeOf(freeze())));
    expect(codes.filter((code) => code === "ok")).toHaveLength(1);
    expect(codes.filter((code) => code === "conflict")).toHaveLength(7);
    expect(await FrozenKey.count({ where: { workId: stage.work.id } })).toBe(1);
  });

  it("against edits at the same moment: the key has what was there before or is refused, never a claim unverified", async () => {
    const claims = [];
    for (let i = 0; i < 6; i++) claims.push(await buildJudged(stage));
    const edit = (claim: Claim) =>
      editClaim(
        {
          workId: stage.work.id,
          claimId: claim.id,
          version: claim.version,
          ref: claim.ref,
          quantity: claim.quantity,
          claimed: "1/7",
          note: null,
          page: null,
        },
        stage.claimant,
      );
    const [frozen, ...edits] = await Promise.all([
      codeOf(freeze()),
      ...claims.map((claim) => codeOf(edit(claim))),
    ]);
    expect(edits.every((code) => code === "ok")).toBe(true);
    expect(["ok", "conflict"]).toContain(frozen);
    const keys = await FrozenKey.findAll({ where: { workId: stage.work.id } });
    expect(keys).toHaveLength(frozen === "ok" ? 1 : 0);
    for (const key of keys)
      for (const claim of (JSON.parse(key.canonicalJson) as KeyContent).claims)
        expect(claim.claimed).toBe("sqrt(30)/15");
  });

  it("ends the undoing of what it holds", async () => {
    const { flag } = await buildWrong(stage);
    await settleFlag(settling(flag, "correct"), stage.second);
    await freeze();
    await flag.reload();
    const error = await undoSettlement(
      { workId: flag.workId, flagId: flag.id, version: flag.version },
      stage.second,
    ).catch((thrown: unknown) => thrown);
    expect(error).toMatchObject({ code: "conflict", message: expect.stringContaining("Key 1") as string });
  });

  it("a later key says what changed since, and points at the one before by its hash", async () => {
    const kept = await buildJudged(stage);
    const changing = await buildJudged(stage, { claimed: "sqrt(30)/15" });
    const leaving = await buildJudged(stage);
    const first = await freeze();
    await leaving.update({ withdrawnAt: new Date() });
    await changing.update({ quantity: "(1 1 0; 0 0 0)", claimed: "-sqrt(3)/3" });
    const added = await buildJudged(stage);
    await freeze(2);
    const view = await getKey(stage.work.id, 2, stage.production);
    expect(view.content.previous).toEqual({ number: "1", sha256: first.sha256 });
    expect(view.changes).toMatchObject({
      same: 1,
      added: [{ id: added.id }],
      gone: [{ id: leaving.id }],
      changed: [
        {
          before: { id: changing.id, answer: { text: "sqrt(30)/15" } },
          after: { answer: { text: "-sqrt(3)/3" } },
        },
      ],
    });
    expect(view.content.claims.some(({ id }) => id === kept.id)).toBe(true);
    expect(view.intact).toBe(true);
  });
});

describe("the database", () => {
  it("refuses to change or delete a frozen key, even for its administrator", async () => {
    await buildJudged(stage);
    await freeze();
    const key = await FrozenKey.findOne({ where: { workId: stage.work.id }, rejectOnEmpty: true });
    await expect(FrozenKey.update({ claims: 7 }, { where: { id: key.id } })).rejects.toThrow();
    await expect(key.destroy()).rejects.toThrow();
    await expect(FrozenKey.destroy({ where: { workId: stage.work.id } })).rejects.toThrow();
    const url = new URL(process.env.TEST_DATABASE_URL ?? "");
    const owner = await createConnection({
      host: url.hostname,
      port: Number(url.port),
      user: decodeURIComponent(url.username),
      password: decodeURIComponent(url.password),
      database: new URL(process.env.DATABASE_URL ?? "").pathname.slice(1),
    });
    try {
      await expect(owner.query("update frozen_keys set claims = 7 where id = ?", [key.id])).rejects.toThrow(
        /never changed/,
      );
      await expect(owner.query("delete from frozen_keys where id = ?", [key.id])).rejects.toThrow(
        /never deleted/,
      );
    } finally {
      await owner.end();
    }
    expect((await key.reload()).claims).toBe(1);
  });

  it("refuses a key whose hash is not that of its content", async () => {
    await expect(
      FrozenKey.create({
        workId: stage.work.id,
        number: 1,
        canonicalJson: "{}",
        sha256: "0".repeat(64),
        claims: 0,
        frozenById: stage.lead.id,
      }),
    ).rejects.toThrow(/frozen_keys_hash_true/);
  });

  it("no number gets into a key but as text", () => {
    expect(() => canonicalJson({ claims: [{ page: 12 }] } as unknown as KeyContent)).toThrow(
      /claims\/0\/page/,
    );
  });
});
