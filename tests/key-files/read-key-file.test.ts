import { createHash } from "node:crypto";
import { describe, expect, it } from "vitest";
import { readKeyFile } from "@/lib/key-files/read-key-file";

const bytes = (text: string) => new TextEncoder().encode(text);
const csv = (text: string) => readKeyFile("key.csv", bytes(text));
const json = (value: unknown) =>
  readKeyFile("key.json", bytes(typeof value === "string" ? value : JSON.stringify(value)));
const HEADER = "ref,quantity,claimed\n";
const ROW = "7.1,(1 1 2; 0 0 0),sqrt(2/15)\n";
const CLAIM = { ref: "7.1", quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/15)" };

describe("a CSV key", () => {
  it("gives rows with their places, and the hash of its bytes", () => {
    const text = `${HEADER}${ROW}7.2,<1 0 1 0 | 2 0>,2/3\n`;
    const key = csv(text);
    expect(key).toMatchObject({ format: "csv", errors: [], notices: [], conventions: null });
    expect(key.rows).toEqual([
      { ...CLAIM, note: null, problem: null, page: null, line: 2, column: 5 },
      {
        ref: "7.2",
        quantity: "<1 0 1 0 | 2 0>",
        claimed: "2/3",
        note: null,
        problem: null,
        page: null,
        line: 3,
        column: 5,
      },
    ]);
    expect(key.sha256).toBe(createHash("sha256").update(text).digest("hex"));
  });

  it("recognises a byte order mark, CR LF and semicolons, and says so", () => {
    const key = csv(`\uFEFFref;quantity;claimed\r\n7.1;"(1 1 2; 0 0 0)";0,3651\r\n`);
    expect(key.errors).toEqual([]);
    expect(key.rows[0]).toMatchObject({ quantity: "(1 1 2; 0 0 0)", claimed: "0,3651", line: 2 });
    expect(key.notices).toEqual([
      "A byte order mark at the start was recognised.",
      "Windows line ends (CR LF) were recognised.",
      "Semicolons between the columns were recognised.",
    ]);
  });

  it("takes the columns in any order, with the optional ones, quotes and line breaks in cells", () => {
    const key = csv(
      `page,claimed,note,quantity,ref,problem\n12,1/2,"a ""quoted""\nnote","(1, 1, 2; 0, 0, 0)",7.1,7\n13,1,,(1 1 2; 0 0 0),7.2,\n`,
    );
    expect(key.errors).toEqual([]);
    expect(key.rows[0]).toMatchObject({
      ref: "7.1",
      page: "12",
      problem: "7",
      note: 'a "quoted"\nnote',
      line: 2,
    });
    expect(key.rows[1]).toMatchObject({ ref: "7.2", note: null, line: 4 });
  });

  it("leaves out empty lines and needs no last line end", () => {
    const key = csv(`${HEADER}\n${ROW}\n\n7.2,(1 1 2; 0 0 0),1`);
    expect(key.rows.map(({ line }) => line)).toEqual([3, 6]);
  });

  it("uses the good rows beside bad ones", () => {
    const key = csv(
      `${HEADER}${ROW}7.2,(1 1 2; 0 0 0)\n7.1,(1 1 2; 0 0 0),1\n,(1 1 2; 0 0 0),1\n7.5,(1 1 2; 0 0 0),1\n`,
    );
    expect(key.rows.map(({ ref }) => ref)).toEqual(["7.1", "7.5"]);
    expect(key.errors).toEqual([
      { line: 3, column: 1, says: "This row has 2 cells, and the header has 3." },
      {
        line: 4,
        column: 1,
        says: "The ref “7.1” already stands on line 2; each claim has a ref of its own.",
      },
      { line: 5, column: 1, says: "The cell “ref” is empty." },
    ]);
  });

  it("takes 20,000 rows and not one more", () => {
    const rows = (count: number) =>
      HEADER + Array.from({ length: count }, (_, n) => `${n},(1 1 2; 0 0 0),1\n`).join("");
    expect(csv(rows(20_000)).rows).toHaveLength(20_000);
    expect(csv(rows(20_001))).toMatchObject({
      rows: [],
      errors: [{ says: "The file has 20,001 rows; at most 20,000 are read." }],
    });
  });
});

const CSV_FAULTS: readonly [name: string, text: string, line: number, column: number, says: RegExp][] = [
  ["nothing", "", 1, 1, /The file is empty/],
  ["only blanks", " \n\n", 1, 1, /The file is empty/],
  ["only a header", HEADER, 1, 1, /header but no claims/],
  ["no header", ROW, 1, 1, /column “7.1” is not known/],
  ["a missing column", "ref,quantity\n7.1,(1 1 2)\n", 1, 1, /lacks the column claimed/],
  ["two missing columns", "ref\n7.1\n", 1, 1, /lacks the columns quantity, claimed/],
  ["a column twice", "ref,quantity,claimed,ref\n", 1, 22, /“ref” stands in the header twice/],
  ["an unknown column", "ref,quantity,claimed,answer\n", 1, 22, /“answer” is not known/],
  ["tabs", "ref\tquantity\tclaimed\n", 1, 1, /separated by tabs/],
  ["an open quote", `${HEADER}7.1,"(1 1 2; 0 0 0),1\n`, 2, 5, /never closed/],
  ["text after a quote", `${HEADER}7.1,"(1 1 2)"x,1\n`, 2, 5, /After a closing quotation mark/],
  ["a quote inside a cell", `${HEADER}7.1,(1 "1" 2),1\n`, 2, 8, /inside a cell that is not quoted/],
  ["too many cells", `${HEADER}7.1,(1,1,2;0,0,0),1\n`, 2, 1, /has 7 cells.*must be quoted/],
  ["too few cells", `${HEADER}7.1\n`, 2, 1, /has 1 cell, and the header has 3/],
  ["an empty quantity", `${HEADER}7.1,,1\n`, 2, 5, /“quantity” is empty/],
  ["an empty value", `${HEADER}7.1,(1 1 2; 0 0 0),\n`, 2, 22, /“claimed” is empty/],
  ["a long cell", `${HEADER}7.1,${"1".repeat(4_001)},1\n`, 2, 5, /has 4,001 characters/],
  ["a very long row", `${HEADER}7.1,${"1".repeat(100_000)},1\n`, 2, 1, /longer than any row/],
  ["a NUL byte", `${HEADER}7.1,(1 \0 2),1\n`, 2, 8, /NUL byte/],
  ["JSON inside", '{"claims": []}', 1, 1, /name that ends in .json/],
  ["a million columns", `${"a,".repeat(1_000_000)}a\n`, 1, 1, /not known|longer than any row|columns/],
];

describe("a CSV key that cannot be used", () => {
  it.each(CSV_FAULTS)("%s", (_name, text, line, column, says) => {
    const key = csv(text);
    const [error] = key.errors;
    expect(error?.says).toMatch(says);
    if (!_name.startsWith("a million")) expect([error?.line, error?.column]).toEqual([line, column]);
    expect(key.rows).toEqual([]);
  });

  const binary: readonly [name: string, start: number[], says: RegExp][] = [
    ["a picture", [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a], /a PNG picture/],
    ["an archive", [0x50, 0x4b, 0x03, 0x04, 0x14], /a ZIP archive or a spreadsheet workbook/],
    ["a PDF", [0x25, 0x50, 0x44, 0x46, 0x2d, 0x31], /a PDF document/],
    ["gzip", [0x1f, 0x8b, 0x08], /a gzip archive/],
    ["a program", [0x7f, 0x45, 0x4c, 0x46], /a program/],
    ["UTF-16 with a mark", [0xff, 0xfe, 0x72, 0x00], /UTF-16 \(little endian\)/],
    ["UTF-16, big endian", [0xfe, 0xff, 0x00, 0x72], /UTF-16 \(big endian\)/],
    [
      "UTF-16 without a mark",
      [...Buffer.from("ref,quantity,claimed\n", "utf16le")],
      /UTF-16 \(little endian\)/,
    ],
  ];
  it.each(binary)("%s is named", (_name, start, says) => {
    expect(readKeyFile("key.csv", Uint8Array.from(start))).toMatchObject({
      rows: [],
      errors: [{ says: expect.stringMatching(says) as string }],
    });
    expect(readKeyFile("key.json", Uint8Array.from(start)).errors[0]?.says).toMatch(says);
  });

  it("names Latin-1 at its byte", () => {
    const latin = Buffer.concat([
      bytes(`${HEADER}${ROW}7.2,(1 1 2; `),
      Buffer.from([0xbd]),
      bytes(" 0 0),1\n"),
    ]);
    expect(readKeyFile("key.csv", latin).errors).toEqual([
      {
        line: 3,
        column: 13,
        says: "The byte BD here is not UTF-8; the file is probably in Latin-1 or a Windows code page. Save it as UTF-8.",
      },
    ]);
  });

  it("names the lead byte, not the good byte after it that shows it to be wrong", () => {
    const latin = Buffer.concat([bytes(`${HEADER}1,(1 1 2; 0 0 0),`), Buffer.from([0xe9]), bytes("\n")]);
    expect(readKeyFile("key.csv", latin).errors).toEqual([
      {
        line: 2,
        column: 18,
        says: "The byte E9 here is not UTF-8; the file is probably in Latin-1 or a Windows code page. Save it as UTF-8.",
      },
    ]);
  });

  it("is refused when it is too large", () => {
    const key = readKeyFile("key.csv", new Uint8Array(2 * 1024 * 1024 + 1).fill(0x61));
    expect(key.errors[0]?.says).toMatch(/at most 2,097,152 \(2 MiB\)/);
  });
});

describe("a JSON key", () => {
  it("gives its conventions and its rows with their places", () => {
    const key = json(
      '{\n  "conventions": {"cgOrder": "j1j2m1m2"},\n  "claims": [\n    {"ref": "7.1", "quantity": "(1 1 2; 0 0 0)", "claimed": "1", "page": "9"}\n  ]\n}\n',
    );
    expect(key).toMatchObject({ format: "json", errors: [], conventions: { cgOrder: "j1j2m1m2" } });
    expect(key.rows).toEqual([
      { ...CLAIM, claimed: "1", note: null, problem: null, page: "9", line: 4, column: 32 },
    ]);
  });

  it("needs no conventions", () =>
    expect(json({ claims: [CLAIM] })).toMatchObject({ conventions: null, rows: [{ ref: "7.1" }] }));

  it("tells a ref that stands twice and keeps the first", () => {
    const key = json({ claims: [CLAIM, CLAIM] });
    expect(key.rows).toHaveLength(1);
    expect(key.errors[0]).toMatchObject({
      pointer: "/claims/1/ref",
      says: expect.stringContaining("already that of claim 1") as string,
    });
  });
});

const JSON_FAULTS: readonly [
  name: string,
  text: string,
  at: [line: number, column: number],
  pointer: string | undefined,
  says: RegExp,
][] = [
  [
    "an open object",
    '{"claims": [',
    [1, 13],
    undefined,
    /a value or \] is expected here, but there is the end of the file/,
  ],
  [
    "a trailing comma",
    '{"claims": [],}',
    [1, 15],
    undefined,
    /a key in quotation marks is expected here, but there is “}”/,
  ],
  ["single quotes", "{'claims': []}", [1, 2], undefined, /a key in quotation marks or } is expected/],
  ["a missing colon", '{"claims" []}', [1, 11], undefined, /a colon is expected/],
  ["a missing comma", '{"claims": ["a" "b"]}', [1, 17], undefined, /a comma or \] is expected/],
  ["text after the end", '{"claims": []} x', [1, 16], undefined, /the end of the file is expected/],
  ["a wrong bracket", '{"claims": [}', [1, 13], undefined, /a value or \] is expected/],
  ["NaN", '{"claims": NaN}', [1, 12], undefined, /a value is expected/],
  ["a leading zero", '{"claims": 01}', [1, 12], undefined, /a value is expected/],
  ["a bad escape", '{"claims": "\\x"}', [1, 12], "/claims", /an escape or a control character/],
  ["an open string", '{"claims": "abc\n"}', [1, 12], undefined, /not closed on its line/],
  ["a key twice", '{"claims": [],\n "claims": []}', [2, 2], "/claims", /stands twice in one object/],
  ["a key twice by escape", '{"a": 1, "\\u0061": 2}', [1, 10], "/a", /stands twice/],
  ["__proto__", '{"claims": [{"__proto__": {}}]}', [1, 14], "/claims/0/__proto__", /not allowed/],
  ["a list", "[]", [1, 1], "", /A key must be an object/],
  ["a string", '"x"', [1, 1], "", /A key must be an object/],
  ["no claims", "{}", [1, 1], "/claims", /“claims” is missing/],
  ["claims that are no list", '{"claims": {}}', [1, 12], "/claims", /“claims” must be a list/],
  ["no claim in it", '{"claims": []}', [1, 12], "/claims", /“claims” is empty/],
  ["an unknown entry", '{"claims": [], "x": 1}', [1, 12], "/claims", /“claims” is empty/],
  ["a claim that is a string", '{"claims": ["x"]}', [1, 13], "/claims/0", /A claim must be an object/],
  [
    "a claim without a value",
    '{"claims": [{"ref": "1", "quantity": "q"}]}',
    [1, 13],
    "/claims/0/claimed",
    /“claimed” is missing/,
  ],
  [
    "a number as value",
    '{"claims": [{"ref": "1", "quantity": "q", "claimed": 0.1}]}',
    [1, 54],
    "/claims/0/claimed",
    /is a number here; write it as a string/,
  ],
  [
    "a number as ref",
    '{"claims": [{"ref": 1, "quantity": "q", "claimed": "1"}]}',
    [1, 21],
    "/claims/0/ref",
    /“ref” is a number here/,
  ],
  [
    "null as quantity",
    '{"claims": [{"ref": "1", "quantity": null, "claimed": "1"}]}',
    [1, 38],
    "/claims/0/quantity",
    /“quantity” must be a string/,
  ],
  [
    "an empty ref",
    '{"claims": [{"ref": "", "quantity": "q", "claimed": "1"}]}',
    [1, 21],
    "/claims/0/ref",
    /“ref” is empty/,
  ],
  [
    "an unknown entry of a claim",
    '{"claims": [{"ref": "1", "quantity": "q", "claimed": "1", "value": "2"}]}',
    [1, 68],
    "/claims/0/value",
    /A claim has no “value”/,
  ],
  [
    "an unknown convention",
    '{"conventions": {"order": "x"}, "claims": []}',
    [1, 27],
    "/conventions/order",
    /“order” is not known/,
  ],
  [
    "a wrong convention",
    '{"conventions": {"cgOrder": "x"}, "claims": []}',
    [1, 29],
    "/conventions/cgOrder",
    /is one of "j1m1j2m2"/,
  ],
  [
    "a convention of another type",
    '{"conventions": {"impliedRoot": "yes"}, "claims": []}',
    [1, 33],
    "/conventions/impliedRoot",
    /true or false/,
  ],
  ["a million brackets", "[".repeat(1_000_000), [1, 17], undefined, /nested more than 16 deep/],
];

describe("a JSON key that cannot be used", () => {
  it.each(JSON_FAULTS)("%s", (_name, text, place, pointer, says) => {
    const key = json(text);
    const error = key.errors.find((each) => says.test(each.says));
    expect(error?.says ?? key.errors).toMatch(says);
    expect([error?.line, error?.column]).toEqual(place);
    expect(error?.pointer).toBe(pointer);
    expect(key.rows).toEqual([]);
  });

  it("leaves prototypes as they are", () => {
    json(
      '{"claims": [{"ref": "1", "quantity": "q", "claimed": "1", "constructor": {"prototype": {"x": 1}}}]}',
    );
    expect(({} as Record<string, unknown>).x).toBeUndefined();
  });

  it("counts what it does not list", () => {
    const key = json({ claims: Array.from({ length: 300 }, () => 1) });
    expect(key.errors).toHaveLength(201);
    expect(key.errors.at(-1)?.says).toBe("100 further errors are not listed.");
  });
});
