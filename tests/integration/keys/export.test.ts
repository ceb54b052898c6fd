import { createHash } from "node:crypto";
import { afterAll, beforeAll, describe, expect, it } from "vitest";

import { readKeyFile } from "@/lib/key-files/read-key-file";
import { AppError } from "@/lib/errors";
import { settleFlag } from "@/lib/flags/settle-flag";
import { exportKey } from "@/lib/keys/export-key";
import { keyAsCsv } from "@/lib/keys/export-csv";
import { keyAsLatex, latexText } from "@/lib/keys/export-latex";
import { freezeKey } from "@/lib/keys/freeze-key";
import { getKey } from "@/lib/keys/get-key";
import { canonicalJson, type KeyClaim, type KeyContent } from "@/lib/keys/key-content";
import { listKeys } from "@/lib/keys/list-keys";
import { KEY_FORMATS, KeyNumber } from "@/lib/keys/schema";
import { typeset } from "@/lib/typeset/typeset";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import { verifyKey } from "@/lib/verify/verify-key";
import { AuditEvent, sequelize } from "@/models";
import { buildStage, buildWrong, settling, type Stage } from "../flags/stage";
import { buildJudged } from "./stage";

let stage: Stage;
beforeAll(async () => {
  stage = await buildStage();
  await buildJudged(stage, { quantity: "(1 1 0; 0 0 0)", claimed: "-sqrt(3)/3" });
  await buildJudged(stage, { quantity: "(1/2 1/2 1; 1/2 -1/2 0)", claimed: "sqrt(6)/6" });
  await buildJudged(stage, { quantity: "<1 0 1 0 | 0 0>", claimed: "-0.5774" });
  await buildJudged(stage, { quantity: "(2 2 1; 0 0 0)", claimed: "0" });
  await buildJudged(stage, {
    quantity: "<1/2 -1/2 1/2 1/2 | 0 0>",
    claimed: "-1/sqrt(2)",
    verdict: "confirmed-not-house-form",
  });
  const { flag } = await buildWrong(stage);
  await settleFlag(settling(flag, "correct"), stage.second);
  await freezeKey({ workId: stage.work.id, number: 1, confirmation: "key 1" }, stage.lead);
});
afterAll(() => sequelize.close());

const bytes = (text: string) => new TextEncoder().encode(text);
const conventions = { ...DEFAULT_CONVENTIONS, houseForm: "rationalised" as const };

describe("downloads", () => {
  it("are for lead, author and production, and written into the audit", async () => {
    const people = {
      lead: stage.lead,
      author: stage.second,
      production: stage.production,
      referee: stage.referee,
      stranger: stage.stranger,
    };
    const answers = Object.fromEntries(
      await Promise.all(
        Object.entries(people).map(async ([who, user]) => {
          const codes = await Promise.all(
            KEY_FORMATS.map((format) =>
              exportKey(stage.work.id, 1, format, user).then(
                () => "ok",
                (error: AppError) => error.code,
              ),
            ),
          );
          return [who, [...new Set(codes)].join()] as const;
        }),
      ),
    );
    expect(answers).toEqual({
      lead: "ok",
      author: "ok",
      production: "ok",
      referee: "not_found",
      stranger: "not_found",
    });
    const events = await AuditEvent.findAll({ where: { workId: stage.work.id, action: "key.export" } });
    expect(events.filter(({ actorId }) => actorId === stage.production.id)).toHaveLength(3);
    expect(events.some(({ actorId }) => actorId === stage.stranger.id || actorId === stage.referee.id)).toBe(
      false,
    );
  });

  it("a number that was never frozen is not there", async () => {
    for (const number of [0, 2, 999_999])
      await expect(exportKey(stage.work.id, number, "json", stage.lead)).rejects.toMatchObject({
        code: "not_found",
      });
    for (const text of ["0", "-1", "1.0", "01", "1e3", "9999999", "one", ""])
      expect(KeyNumber.safeParse(text).success).toBe(false);
  });

  it("JSON: the hash is that of the canonical JSON without the two members beside it; read again, all confirmed", async () => {
    const { body } = await exportKey(stage.work.id, 1, "json", stage.production);
    const {
      sha256,
      export: made,
      ...content
    } = JSON.parse(body) as KeyContent & { sha256: string; export: { by: string } };
    expect(createHash("sha256").update(canonicalJson(content)).digest("hex")).toBe(sha256);
    expect(made.by).toBe(stage.production.name);
    const file = readKeyFile("key.json", bytes(body));
    expect(file.errors).toEqual([]);
    const { summary } = verifyKey({ conventions: file.conventions ?? {}, claims: file.rows });
    expect(summary).toMatchObject({ total: 6, confirmed: 6 });
  });

  it("CSV: read again by the product's reader, all confirmed", async () => {
    const { body, contentType } = await exportKey(stage.work.id, 1, "csv", stage.production);
    expect(contentType).toMatch(/^text\/csv; charset=utf-8/);
    expect(body.split("\r\n")[0]).toBe("ref,quantity,claimed,note,problem,page");
    const file = readKeyFile("key.csv", bytes(body));
    expect(file.errors).toEqual([]);
    expect(file.rows).toHaveLength(6);
    const { summary } = verifyKey({ conventions, claims: file.rows });
    expect(summary).toMatchObject({ total: 6, confirmed: 6 });
    expect(body).toContain(`by ${stage.production.name}`);
  });

  it("LaTeX: every answer stands in it and can be set; braces are balanced; it is made for a file alone or inside a book", async () => {
    const { body, fileName } = await exportKey(stage.work.id, 1, "latex", stage.production);
    expect(fileName).toMatch(/^work-\d+-key-1\.tex$/);
    const { content } = await getKey(stage.work.id, 1, stage.production);
    for (const claim of content.claims) {
      expect(body).toContain(`$${claim.quantityLatex}$ $=$ $${claim.answer.latex}$`);
      expect(typeset(claim.answer.latex ?? "", { own: true })).not.toContain("math-source");
    }
    const code = body.replace(/^%.*$/gm, "").replace(/\\[{}]/g, "");
    expect(code.split("{").length).toBe(code.split("}").length);
    expect(body.match(/\\ifdefined/g)).toHaveLength(2);
    expect(body.match(/^\\fi$|\\fi$/gm)).toHaveLength(2);
    expect(body.trimEnd().endsWith("\\end{document}")).toBe(true);
  });

  it("production sees keys and nothing else of the work", async () => {
    const view = await listKeys(stage.work.id, stage.production);
    expect(view.keys).toMatchObject([{ number: 1, claims: 6 }]);
    expect(view.preflight).toBeNull();
  });
});

describe("what people wrote, in a file", () => {
  const claim: KeyClaim = {
    id: "x",
    chapter: "1",
    problem: "1.1",
    ref: "1.1(a)",
    page: null,
    quantity: "(1 1 2; 0 0 0)",
    quantityLatex: null,
    claimed: "1",
    claimedLatex: null,
    answer: { text: "1", latex: null },
    value: null,
    verdict: "discrepant",
    settlement: null,
    waiver: null,
  };
  const content = (changes: Partial<KeyClaim>): KeyContent => ({
    format: "surdmark-key-1",
    work: { title: "A % title \\input{x} \n\\end{document}", kind: "book" },
    number: "1",
    frozenAt: "2026-12-01T00:00:00.000Z",
    frozenBy: "A",
    engine: "1",
    conventions,
    conventionsVersion: "1",
    previous: null,
    chapters: [{ number: "1", title: "50 % & more_" }],
    claims: [{ ...claim, ...changes }],
    withdrawn: [],
  });
  const made = { by: "=cmd|' /C calc'!A0", at: "2026-12-01T00:00:00.000Z" };

  const cells: [Partial<KeyClaim>, string][] = [
    [{ answer: { text: "-3", latex: null } }, ",-3,"],
    [{ answer: { text: "-1/2", latex: null } }, ",-1/2,"],
    [{ answer: { text: "-0.125", latex: null } }, ",-0.125,"],
    [{ answer: { text: "-sqrt(3)/3", latex: null } }, ",−sqrt(3)/3,"],
    [{ answer: { text: "+sqrt(3)/3", latex: null } }, ",sqrt(3)/3,"],
    [{ ref: "=HYPERLINK(1)" }, "\n'=HYPERLINK(1),"],
    [{ ref: "@SUM(1)" }, "\n'@SUM(1),"],
    [{ ref: "-2+3" }, "\n'-2+3,"],
    [{ problem: "|x" }, ",'|x,"],
    [{ ref: 'a"b,c' }, '\n"a""b,c",'],
  ];
  for (const [changes, expected] of cells)
    it(`CSV of ${JSON.stringify(changes)} has ${JSON.stringify(expected)} and no cell that a spreadsheet would compute`, () => {
      const csv = keyAsCsv(content(changes), "0".repeat(64), made);
      expect(csv).toContain(expected);
      for (const cell of csv.split(/\r\n|,/)) expect(cell).not.toMatch(/^"?[=+@\t|]/);
    });

  it("LaTeX: no word of a person is a command, and no line of a comment ends early", () => {
    const tex = keyAsLatex(
      content({
        ref: "\\write18{x}",
        settlement: { word: "stet", reason: "50% & $x$ \\input{y}", convention: "#1 ~^", by: "B", at: "" },
      }),
      "0".repeat(64),
      { by: "Eve\n\\input{/etc/passwd}", at: "" },
    );
    const code = tex.split("\n").filter((line) => !line.startsWith("%"));
    expect(code.join("\n")).not.toMatch(/\\input|\\write/);
    expect(code.filter((line) => line.startsWith("\\end{document}"))).toHaveLength(1);
    expect(latexText("\\{}$&#_%^~<>|")).toBe(
      "\\textbackslash{}\\{\\}\\$\\&\\#\\_\\%\\textasciicircum{}\\textasciitilde{}\\textless{}\\textgreater{}\\textbar{}",
    );
  });
});
