import { readFileSync } from "node:fs";
import path from "node:path";
import { describe, expect, it } from "vitest";

const css = readFileSync(path.join(import.meta.dirname, "../../app/globals.css"), "utf8");

/** The colours declared in the first block that follows the given selector. */
function tokens(selector: string): Record<string, string> {
  const from = css.indexOf(selector);
  const block = css.slice(from, css.indexOf("}", from));
  return Object.fromEntries([...block.matchAll(/--([\w-]+): (#[0-9a-f]{6});/g)].map((m) => [m[1], m[2]]));
}

/** Relative luminance, WCAG 2.2. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const c = Number.parseInt(hex.slice(at, at + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  }) as [number, number, number];
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(a: string, b: string): number {
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y) as [number, number];
  return (high + 0.05) / (low + 0.05);
}

const THEMES = {
  light: tokens(":root {"),
  "dark by system": tokens(':root:not([data-theme="light"]) {'),
  "dark by choice": tokens(':root[data-theme="dark"] {'),
};
const GROUNDS = ["paper", "sheet", "sunk", "blue-wash", "red-wash", "green-wash", "amber-wash"];

describe.each(Object.entries(THEMES))("%s", (_, theme) => {
  it.each(["ink", "quiet", "blue", "red", "green", "amber"])("%s is readable on every ground", (name) => {
    for (const ground of GROUNDS)
      expect(contrast(theme[name] ?? "", theme[ground] ?? ""), `${name} on ${ground}`).toBeGreaterThanOrEqual(
        4.5,
      );
  });

  it("edges of controls stand out from every ground", () => {
    for (const ground of GROUNDS)
      expect(contrast(theme.edge ?? "", theme[ground] ?? ""), `edge on ${ground}`).toBeGreaterThanOrEqual(3);
  });

  it("type on filled buttons is readable", () => {
    for (const fill of ["ink", "quiet", "red"])
      expect(contrast(theme.sheet ?? "", theme[fill] ?? ""), `sheet on ${fill}`).toBeGreaterThanOrEqual(4.5);
  });
});

it("both dark themes are the same", () => {
  expect(THEMES["dark by system"]).toEqual(THEMES["dark by choice"]);
});
