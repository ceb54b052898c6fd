import { describe, expect, it } from "vitest";
import { AppError } from "@/lib/errors";
import { attachment, cleanFileName } from "@/lib/sources/file-name";

describe("the name of an uploaded file", () => {
  it.each([
    ["key.csv", "key.csv"],
    ["Chapter 7.JSON", "Chapter 7.JSON"],
    ["a.CSV ", "a.CSV"],
    ["../../etc/passwd.csv", "passwd.csv"],
    ["C:\\keys\\chapter.csv", "chapter.csv"],
    ["con.csv", "con.csv"],
    ["-rf.csv", "-rf.csv"],
    [".csv", "key.csv"],
    ["$(touch x).csv", "$(touch x).csv"],
    ["line\r\nbreak.csv", "linebreak.csv"],
    ["vsc\u202efdp.csv", "vscfdp.csv"],
    ["e\u0301tude.csv", "étude.csv"],
    ["<img src=x>.json", "<img src=x>.json"],
  ])("%j becomes %j", (given, kept) => expect(cleanFileName(given)).toBe(kept));

  it.each([
    "a.csv.exe",
    "a.csv%00.png",
    "key",
    ".htaccess",
    "a.tex",
    "a.xlsx",
    "a.csv.",
    "",
    "a.csv\0.png",
    "\0.csv",
  ])("%j is refused", (given) => expect(() => cleanFileName(given)).toThrow(AppError));

  it("is never longer than its column, however it is spelt", () => {
    for (const name of [`${"a".repeat(5_000)}.csv`, `${"😀".repeat(300)}.json`, `${"é".repeat(400)}.csv`]) {
      const kept = cleanFileName(name);
      expect(kept.length).toBeLessThanOrEqual(255);
      expect(kept).toMatch(/\.(csv|json)$/);
      expect(kept).toBe(Buffer.from(kept).toString());
    }
  });
});

describe("the name under which it is sent back", () => {
  it.each([
    ["key.csv", `attachment; filename="key.csv"; filename*=UTF-8''key.csv`],
    ['a"b;c.csv', `attachment; filename="a_b_c.csv"; filename*=UTF-8''a%22b%3Bc.csv`],
    ["étude 7.csv", `attachment; filename="_tude 7.csv"; filename*=UTF-8''%C3%A9tude%207.csv`],
    [
      "a\r\nSet-Cookie: x.csv",
      `attachment; filename="aSet-Cookie: x.csv"; filename*=UTF-8''aSet-Cookie%3A%20x.csv`,
    ],
    ["../up.csv", `attachment; filename=".._up.csv"; filename*=UTF-8''.._up.csv`],
    ["it's (1).csv", `attachment; filename="it's (1).csv"; filename*=UTF-8''it%27s%20%281%29.csv`],
  ])("%j", (name, header) => expect(attachment(name)).toBe(header));

  it("is one well-formed header of at most 255 bytes of name, for 300 emoji too", () => {
    for (const name of [`${"😀".repeat(300)}.csv`, "\ud800x.csv", "\u202egnp.csv"]) {
      const header = attachment(name);
      const whole = decodeURIComponent(/filename\*=UTF-8''(\S+)$/.exec(header)?.[1] ?? "");
      expect(header).toMatch(/^attachment; filename="[\x20-\x7e]*"; filename\*=UTF-8''[A-Za-z0-9._~%-]+$/);
      expect(Buffer.byteLength(whole)).toBeLessThanOrEqual(255);
      expect(whole).toMatch(/\.csv$/);
      expect(() => new Headers({ "content-disposition": header })).not.toThrow();
    }
  });
});
