import { afterAll, beforeAll, describe, expect, it } from "vitest";

import { AppError } from "@/lib/errors";
import { getFlag } from "@/lib/flags/get-flag";
import { FlagQuery } from "@/lib/flags/flag-query";
import { SettleFlag } from "@/lib/flags/schema";
import { settleFlag } from "@/lib/flags/settle-flag";
import { undoSettlement } from "@/lib/flags/undo-settlement";
import { AuditEvent, ClaimVersion, Flag, Outbox, sequelize, Settlement } from "@/models";
import { buildSettlement } from "../../factories";
import { buildStage, buildWrong, settling, type Stage } from "./stage";

const WORDS = ["correct", "stet", "reword", "withdraw"] as const;

let stage: Stage;
beforeAll(async () => {
  stage = await buildStage();
});
afterAll(() => sequelize.close());

const codeOf = async (promise: Promise<unknown>): Promise<string> =>
  promise.then(
    () => "ok",
    (error: unknown) => (error instanceof AppError ? error.code : `bug: ${String(error)}`),
  );

describe("who may settle", () => {
  type Who = "lead" | "claimant" | "second" | "referee" | "production" | "stranger";
  const table: { who: Who; owns: boolean; assigned: boolean; answer: string }[] = [
    { who: "lead", owns: false, assigned: false, answer: "ok" },
    { who: "lead", owns: true, assigned: false, answer: "forbidden" },
    { who: "second", owns: false, assigned: false, answer: "ok" },
    { who: "second", owns: false, assigned: true, answer: "ok" },
    { who: "second", owns: true, assigned: false, answer: "forbidden" },
    { who: "referee", owns: false, assigned: true, answer: "ok" },
    { who: "referee", owns: false, assigned: false, answer: "forbidden" },
    { who: "production", owns: false, assigned: false, answer: "not_found" },
    { who: "stranger", owns: false, assigned: false, answer: "not_found" },
  ];
  for (const { who, owns, assigned, answer } of table)
    for (const word of WORDS)
      it(`${who}, ${owns ? "own" : "another's"} claim${assigned ? ", assigned" : ""}, ${word}: ${answer}`, async () => {
        const { flag, claim } = await buildWrong(stage, {
          ...(owns && { claimantId: stage[who].id }),
          assigneeId: assigned ? stage[who].id : null,
        });
        expect(await codeOf(settleFlag(settling(flag, word), stage[who]))).toBe(answer);
        await flag.reload();
        await claim.reload();
        expect(flag.state).toBe(answer === "ok" ? "settled" : "open");
        if (answer !== "ok") expect(claim.claimed).toBe("sqrt(2)/15");
      });

  it("is refused by the database too, whatever wrote the row", async () => {
    const { flag } = await buildWrong(stage);
    await expect(buildSettlement({ flagId: flag.id, settlerId: stage.claimant.id })).rejects.toThrow(
      /settlements_by_somebody_else/,
    );
  });

  it("says in the flag's page why a claimant cannot", async () => {
    const { flag } = await buildWrong(stage);
    const view = await getFlag(stage.work.id, flag.id, FlagQuery.parse({}), stage.claimant);
    expect(view.may.settle).toBe(false);
    expect(view.whyNot).toMatch(/your own claim/i);
  });
});

describe("what each word does", () => {
  it("correct: the claim gets the recomputed value in house form, confirmed, and the claimant is told", async () => {
    const { flag, claim } = await buildWrong(stage);
    await settleFlag(settling(flag, "correct", { reason: undefined }), stage.second);
    await claim.reload();
    expect(claim).toMatchObject({
      claimed: "sqrt(30)/15",
      verdict: "confirmed",
      current: 2,
      claimantId: stage.claimant.id,
    });
    const version = await ClaimVersion.findOne({
      where: { claimId: claim.id, number: 2 },
      rejectOnEmpty: true,
    });
    expect(version).toMatchObject({ claimed: "sqrt(30)/15", origin: "corrected", authorId: stage.second.id });
    const mails = await Outbox.findAll({ where: { kind: "mail" } });
    const mail = mails.find(({ payload }) => JSON.stringify(payload).includes(claim.id));
    expect(mail?.payload).toMatchObject({ template: "claim-corrected", to: stage.claimant.email });
    expect(JSON.stringify(mail?.payload)).not.toContain("sqrt");
  });

  it("stet: the claim stands, with reason and convention", async () => {
    const { flag, claim } = await buildWrong(stage);
    await settleFlag(settling(flag, "stet"), stage.second);
    await claim.reload();
    expect(claim).toMatchObject({ claimed: "sqrt(2)/15", verdict: "discrepant", current: 1 });
    const settlement = await Settlement.findOne({ where: { activeFlagId: flag.id }, rejectOnEmpty: true });
    expect(settlement).toMatchObject({ word: "stet", convention: "symbols without the phase, table A.4" });
  });

  it("withdraw: the claim leaves the key", async () => {
    const { flag, claim } = await buildWrong(stage);
    await settleFlag(settling(flag, "withdraw"), stage.second);
    expect((await claim.reload()).withdrawnAt).toBeInstanceOf(Date);
  });

  it("leaves an audit event with what was and what is", async () => {
    const { flag } = await buildWrong(stage);
    await settleFlag(settling(flag, "correct"), stage.second);
    const event = await AuditEvent.findOne({
      where: { action: "flag.settle", subjectId: flag.id },
      rejectOnEmpty: true,
    });
    expect(event.actorId).toBe(stage.second.id);
    expect(event.before).toMatchObject({ claimed: "sqrt(2)/15" });
    expect(event.after).toMatchObject({ word: "correct", claimed: "sqrt(30)/15" });
  });

  it("correct cannot be taken where nothing could be recomputed", async () => {
    const { flag, claim } = await buildWrong(stage, { quantity: "(1 1 2; 0 0", claimed: "1" });
    expect(await codeOf(settleFlag(settling(flag, "correct"), stage.second))).toBe("invalid");
    expect((await claim.reload()).claimed).toBe("1");
    expect((await flag.reload()).state).toBe("open");
  });

  const asked: { word: (typeof WORDS)[number]; reason?: string; convention?: string; fields: string[] }[] = [
    { word: "stet", fields: ["reason", "convention"] },
    { word: "stet", reason: "too short", convention: "table 4", fields: ["reason"] },
    { word: "stet", reason: "long enough to be a reason", fields: ["convention"] },
    { word: "stet", reason: "          x          ", convention: "table 4", fields: ["reason"] },
    { word: "reword", fields: ["reason"] },
    { word: "correct", fields: [] },
    { word: "withdraw", fields: [] },
  ];
  for (const { word, reason, convention, fields } of asked)
    it(`${word} with reason “${reason ?? ""}” and convention “${convention ?? ""}” asks for ${fields.join(" and ") || "nothing more"}`, () => {
      const read = SettleFlag.safeParse({
        workId: stage.work.id,
        flagId: stage.work.id,
        version: 0,
        word,
        reason,
        convention,
      });
      expect(read.success ? [] : read.error.issues.map(({ path }) => path[0])).toEqual(fields);
    });
});

describe("two people at once", () => {
  it("twenty settlements of one flag: one wins, the others hear who it was and how", async () => {
    for (let round = 0; round < 3; round++) {
      const { flag, claim } = await buildWrong(stage);
      const words = Array.from({ length: 20 }, (_, i) => WORDS[i % 4] ?? "stet");
      const results = await Promise.all(
        words.map((word, i) =>
          settleFlag(settling(flag, word), i % 2 === 0 ? stage.second : stage.lead).then(
            () => ({ word, error: null }),
            (error: unknown) => ({ word, error }),
          ),
        ),
      );
      const won = results.filter(({ error }) => error === null);
      expect(won).toHaveLength(1);
      const settlement = await Settlement.findOne({ where: { activeFlagId: flag.id }, rejectOnEmpty: true });
      expect(settlement.word).toBe(won[0]?.word);
      const winner = settlement.settlerId === stage.lead.id ? stage.lead.name : stage.second.name;
      for (const { error } of results) {
        if (error === null) continue;
        expect(error).toBeInstanceOf(AppError);
        const { code, message, details } = error as AppError;
        expect(code).toBe("conflict");
        expect(message).toContain(winner);
        expect(details).toMatchObject({ by: winner, word: settlement.word });
      }
      expect(await Settlement.count({ where: { flagId: flag.id } })).toBe(1);
      await claim.reload();
      expect(claim.current).toBe(settlement.word === "correct" ? 2 : 1);
      expect(claim.withdrawnAt !== null).toBe(settlement.word === "withdraw");
      expect(await ClaimVersion.count({ where: { claimId: claim.id } })).toBe(claim.current);
    }
  });

  it("a flag that changed since it was read is not settled by the old form", async () => {
    const { flag } = await buildWrong(stage);
    const old = settling(flag, "stet");
    await flag.update({ assigneeId: stage.second.id });
    expect(await codeOf(settleFlag(old, stage.second))).toBe("conflict");
  });
});

describe("undo", () => {
  const undo = async (flag: Flag) => ({
    workId: flag.workId,
    flagId: flag.id,
    version: (await flag.reload()).version,
  });

  it("correct: the text comes back as a new version, and the flag is open again", async () => {
    const { flag, claim } = await buildWrong(stage);
    await settleFlag(settling(flag, "correct"), stage.second);
    await undoSettlement(await undo(flag), stage.second);
    await claim.reload();
    await flag.reload();
    expect(claim).toMatchObject({
      claimed: "sqrt(2)/15",
      verdict: "discrepant",
      current: 3,
      findingId: flag.findingId,
    });
    expect(flag).toMatchObject({ state: "open", openClaimId: claim.id, claimVersion: 3 });
    const version = await ClaimVersion.findOne({
      where: { claimId: claim.id, number: 3 },
      rejectOnEmpty: true,
    });
    expect(version.origin).toBe("undone");
    await settleFlag(settling(flag, "stet"), stage.lead);
    expect(await Settlement.count({ where: { flagId: flag.id } })).toBe(2);
  });

  it("withdraw: the claim is back in the key", async () => {
    const { flag, claim } = await buildWrong(stage);
    await settleFlag(settling(flag, "withdraw"), stage.second);
    await undoSettlement(await undo(flag), stage.lead);
    expect((await claim.reload()).withdrawnAt).toBeNull();
  });

  it("only by the settler or a lead", async () => {
    const { flag } = await buildWrong(stage, { assigneeId: stage.referee.id });
    await settleFlag(settling(flag, "stet"), stage.referee);
    const input = await undo(flag);
    expect(await codeOf(undoSettlement(input, stage.second))).toBe("forbidden");
    expect(await codeOf(undoSettlement(input, stage.production))).toBe("not_found");
    expect(await codeOf(undoSettlement(input, stage.stranger))).toBe("not_found");
    expect(await codeOf(undoSettlement(input, stage.referee))).toBe("ok");
  });

  it("ten at once: one undoes", async () => {
    const { flag } = await buildWrong(stage);
    await settleFlag(settling(flag, "correct"), stage.second);
    const input = await undo(flag);
    const codes = await Promise.all(
      Array.from({ length: 10 }, () => codeOf(undoSettlement(input, stage.second))),
    );
    expect(codes.filter((code) => code === "ok")).toHaveLength(1);
    expect(codes.filter((code) => code === "conflict")).toHaveLength(9);
    expect(await ClaimVersion.count({ where: { claimId: flag.claimId } })).toBe(3);
  });
});
