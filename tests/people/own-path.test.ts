import { expect, it } from "vitest";
import { ownPath } from "@/lib/auth/own-path";

it.each(["/desk", "/works/1?page=2#a", "/works/%C3%A4"])("goes to %s", (path) => {
  expect(ownPath(path)).toBe(path);
});

it.each([
  "//evil.example",
  "/\\evil.example",
  "\\/evil.example",
  "https:evil.example",
  "https://app.evil.example",
  "javascript:alert(1)",
  "%2f%2fevil.example",
  "/%2fevil.example",
  "/%5cevil.example",
  "/\t/evil.example",
  "/%09/evil.example\n",
  "http://app@evil.example",
  "desk",
  "",
  "/%",
  "/x".padEnd(10_000, "x"),
  ["/desk"],
  undefined,
  null,
  7,
])("goes to the desk instead of %s", (path) => {
  expect(ownPath(path)).toBe("/desk");
});

it("keeps what it gives on its own site, whatever it was given", () => {
  for (const path of ["/..//evil.example", "/./\u002fevil.example", "/a/../../evil.example"]) {
    const url = new URL(ownPath(path), "https://surdmark.example");
    expect(url.origin).toBe("https://surdmark.example");
  }
});
