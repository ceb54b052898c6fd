import { describe, expect, it } from "vitest";
import { readKeyFile } from "@/lib/key-files/read-key-file";
import { planRows, type Standing } from "@/lib/sources/plan-rows";
import { readRows, type ConventionsChoice } from "@/lib/sources/read-rows";
import { differences, translateRow } from "@/lib/sources/translate";
import { DEFAULT_CONVENTIONS, type Conventions } from "@/lib/verify/conventions";

const standing = (ref: string, given: Partial<Standing> = {}): [string, Standing] => [
  ref,
  {
    id: ref,
    ref,
    chapterId: "here",
    label: "7.3",
    current: 1,
    quantity: "(1 1 2; 0 0 0)",
    claimed: "sqrt(30)/15",
    note: null,
    page: null,
    withdrawn: false,
    ...given,
  },
];

async function plan(
  text: string,
  claims: [string, Standing][] = [],
  sheet: Partial<Conventions> = {},
  choice: ConventionsChoice = "sheet",
) {
  const file = readKeyFile(text.trimStart().startsWith("{") ? "key.json" : "key.csv", Buffer.from(text));
  return planRows(
    await readRows(file, { ...DEFAULT_CONVENTIONS, ...sheet }, choice),
    new Map(claims),
    "here",
  );
}

const csv = (...rows: string[]) => `ref,quantity,claimed,note,problem,page\n${rows.join("\n")}\n`;
const S = "(1 1 2; 0 0 0)";

describe("what accepting a file would do", () => {
  it("adds, replaces, leaves alone and refuses, each with its reason", async () => {
    const { rows, counts } = await plan(
      csv(
        `7.3(a),${S},1/3,,,`,
        `7.3(b),${S},sqrt(30)/15,,,`,
        `7.3(c),${S},1/3,,,`,
        `7.3(d),${S},1/3,,,`,
        `7.4,${S},1/3,,,`,
        `7.5,(1 1 2; 0 0,1/3,,,`,
      ),
      [
        standing("7.3(a)"),
        standing("7.3(b)"),
        standing("7.3(c)", { chapterId: "there" }),
        standing("7.3(d)", { withdrawn: true }),
      ],
    );
    expect(rows.map(({ effect }) => effect)).toEqual([
      "replaces",
      "nothing",
      "refused",
      "refused",
      "adds",
      "adds",
    ]);
    expect(rows.map(({ says }) => says)).toEqual([
      null,
      null,
      "7.3(c) is already a claim of another chapter of this work.",
      "7.3(d) was withdrawn. Restore it first, then accept this row.",
      null,
      null,
    ]);
    expect(counts).toEqual({ adds: 2, replaces: 1, nothing: 1, refused: 2, unreadable: 1 });
  });

  it("keeps note and page where the file says nothing of them, and takes them where it does", async () => {
    const claims = [standing("7.3(a)", { note: "by hand", page: "12" })];
    expect((await plan(csv(`7.3(a),${S},sqrt(30)/15,,,`), claims)).rows[0]?.effect).toBe("nothing");
    expect((await plan(csv(`7.3(a),${S},sqrt(30)/15,by table,,`), claims)).rows[0]?.effect).toBe("replaces");
  });

  it("finds the problem of a row by its own column, else by the look of its ref", async () => {
    const { rows } = await plan(
      csv(
        `7.3(a),${S},1,,,`,
        `7.3(a)(ii),${S},1,,,`,
        `7.4b,${S},1,,,`,
        `A.1,${S},1,,,`,
        `x,${S},1,,9.9,`,
        `(c),${S},1,,,`,
      ),
    );
    expect(rows.map(({ label }) => label)).toEqual(["7.3", "7.3", "7.4", "A.1", "9.9", "(c)"]);
  });

  it("says where a claim stays when the file puts it elsewhere", async () => {
    const { rows } = await plan(csv(`7.3(a),${S},1/3,,8.1,`), [standing("7.3(a)")]);
    expect(rows[0]).toMatchObject({ effect: "replaces", says: "It stays with problem 7.3." });
  });

  it.each([
    [`${"x".repeat(61)},${S},1,,,`, /ref: At most 60 characters/],
    [`7.1,${S},1,${"n".repeat(501)},,`, /note: At most 500/],
    [`7.1,${S},1,,,${"p".repeat(21)}`, /page: At most 20/],
    [`7.1,${S},1,,${"l".repeat(41)},`, /label may have 40/],
    [`7.1,${S},1\u202e2,,,`, /claimed: .*direction of writing/],
    [`7\u0007.1,${S},1,,,`, /ref: .*control character/],
  ])("refuses %j", async (row, says) => {
    const { rows } = await plan(csv(row));
    expect(rows[0]).toMatchObject({ effect: "refused", says: expect.stringMatching(says) as string });
  });

  it("takes two spellings of one ref for one, and refuses both when they differ", async () => {
    const { rows } = await plan(csv(`\u00e9,${S},1,,,`, `e\u0301,${S},2,,,`));
    expect(rows.map(({ effect }) => effect)).toEqual(["refused", "refused"]);
    expect(rows[0]?.says).toBe("\u00e9 stands on lines 2 and 3 with different content; keep one of them.");
  });

  it("has another fingerprint as soon as it would do something else", async () => {
    const text = csv(`7.3(a),${S},1/3,,,`);
    const prints = await Promise.all([
      plan(text),
      plan(text, [standing("7.3(a)")]),
      plan(text, [standing("7.3(a)", { current: 2 })]),
      plan(text, [standing("7.3(a)", { withdrawn: true })]),
      plan(csv(`7.3(a),${S},1/5,,,`)),
    ]);
    expect(new Set(prints.map(({ fingerprint }) => fingerprint)).size).toBe(5);
    expect((await plan(text)).fingerprint).toBe(prints[0]?.fingerprint);
    expect((await plan(text, [standing("9.9")])).fingerprint).toBe(prints[0]?.fingerprint);
  });
});

describe("a file with conventions of its own", () => {
  const own =
    '{"conventions": {"cgOrder": "j1j2m1m2", "impliedRoot": true}, "claims": [{"ref": "1", "quantity": "<1 1 1 -1 | 2 0>", "claimed": "-1/6"}, {"ref": "2", "quantity": "(1 1 2; 0 0 0)", "claimed": "sqrt(2/15)"}]}';

  it("is never translated unless that was chosen", async () => {
    const { rows } = await plan(own);
    expect(rows[0]).toMatchObject({ quantity: "<1 1 1 -1 | 2 0>", claimed: "-1/6", written: null });
  });

  it("is rewritten so that the sheet reads the same symbol and value, and only where it must be", async () => {
    const { rows } = await plan(own, [], {}, "file");
    expect(rows[0]).toMatchObject({
      quantity: "<1 1 1 -1 | 2 0>",
      written: { claimed: "-1/6" },
    });
    expect(rows[0]?.claimed).toBe("-sqrt(6)/6");
    expect(rows[1]).toMatchObject({ claimed: "sqrt(2/15)", written: null });
  });

  it("changes the order of a CG coefficient, roots understood and the decimal mark, in both directions", () => {
    const sheet = DEFAULT_CONVENTIONS;
    const other: Conventions = { ...sheet, cgOrder: "j1j2m1m2", impliedRoot: true, decimalMark: "," };
    expect(translateRow({ quantity: "<1 1/2 0 1/2 | 3/2 1/2>", claimed: "2/3" }, other, sheet)).toEqual({
      quantity: "<1 0 1/2 1/2 | 3/2 1/2>",
      claimed: "sqrt(6)/3",
    });
    expect(translateRow({ quantity: "<1 0 1/2 1/2 | 3/2 1/2>", claimed: "sqrt(2/3)" }, sheet, other)).toEqual(
      { quantity: "<1 1/2 0 1/2 | 3/2 1/2>", claimed: "sqrt(2/3)" },
    );
    expect(translateRow({ quantity: "(1 1 2; 0 0 0)", claimed: "0,3651" }, other, sheet)).toEqual({
      quantity: "(1 1 2; 0 0 0)",
      claimed: "0.3651",
    });
    expect(translateRow({ quantity: "nonsense", claimed: "also" }, other, sheet)).toBeNull();
  });

  it("tells each difference in words", () => {
    expect(differences({ cgOrder: "j1j2m1m2", impliedRoot: false }, DEFAULT_CONVENTIONS)).toEqual([
      expect.objectContaining({ file: "both j, then both m", sheet: "each j followed by its m" }),
    ]);
    expect(differences(null, DEFAULT_CONVENTIONS)).toEqual([]);
  });
});
