import { describe, expect, it } from "vitest";

import { typeset, typesetCacheBytes, TYPESET_LIMITS } from "@/lib/typeset/typeset";
import { typesetText } from "@/lib/typeset/typeset-text";

const source = (html: string) => html.startsWith('<code class="math-source"');

// Each of these runs for seconds or fills memory in a typesetter without limits.
const BOMBS: Record<string, string> = {
  "a macro used thirty times": `\\def\\a{${"x".repeat(4_000)}}${"\\a".repeat(30)}`,
  "a short definition": "\\def\\a{\\b\\b}\\a",
  "a global definition": "\\gdef\\a{x}\\a",
  "an expanded definition": "\\edef\\a{x}\\a",
  "a let": "\\let\\a=b\\a",
  "a new command": "\\newcommand{\\a}{\\a\\a}\\a",
  "a starred new command": "\\newcommand*{\\a}{x}\\a",
  "a command by name": "\\csname a\\endcsname",
  "delayed expansion": "\\expandafter\\frac 1 2",
  "a loop": "\\loop x \\repeat",
  "an input": "\\input{/etc/passwd}",
  "100,000 digits": "1".repeat(100_000),
  "5,000 nested braces": "{".repeat(5_000) + "}".repeat(5_000),
  "900 nested braces": "{".repeat(900) + "}".repeat(900),
  "nested roots without braces": `${"\\sqrt".repeat(300)}x`,
  "nested delimiters": "\\left(".repeat(200) + "\\right)".repeat(200),
  "thousands of cells": `\\begin{matrix}${"&".repeat(1_900)}\\end{matrix}`,
  "more macros than may be expanded": "\\neq".repeat(300),
};

describe("what is refused is shown as escaped source", () => {
  it.each(Object.entries(BOMBS))("%s", (_, latex) => {
    const html = typeset(latex);
    expect(source(html)).toBe(true);
    expect(html.length).toBeLessThan(6 * TYPESET_LIMITS.characters + 200);
  });

  it("says why", () => {
    expect(typeset("\\def\\a{x}")).toContain("Shown as source: \\def is not set here");
    expect(typeset("x".repeat(2_001))).toContain("longer than 2000 characters");
  });

  it("keeps a defined macro from the next formula", () => {
    typeset("\\gdef\\leak{x}");
    expect(source(typeset("\\leak"))).toBe(true);
  });
});

describe("nothing a person writes becomes markup", () => {
  const hostile = [
    "\\href{javascript:alert(1)}{x}",
    "\\url{javascript:alert(1)}",
    "\\htmlStyle{background:url(x)}{y}",
    "\\htmlId{a}{x}",
    "\\includegraphics{http://example.org/x.png}",
    "\\undefined<img src=x onerror=alert(1)>",
    "\\text{<script>alert(1)</script>}",
    'x"onfocus="alert(1)',
    "</annotation></math><img src=x onerror=alert(1)>",
  ];
  it.each(hostile)("%s", (latex) => {
    for (const html of [
      typeset(latex),
      typeset(latex, { display: true }),
      typesetText(`a $${latex}$ b`),
      typesetText(latex),
    ]) {
      expect(html).not.toMatch(/<(img|script|a|iframe)\b/i);
      expect(html).not.toMatch(/\shref=|\son\w+=(?!&)["']/i);
    }
  });
});

describe("what is set", () => {
  it("carries MathML with its source for assistive technology", () => {
    const html = typeset("\\sqrt{\\tfrac{2}{15}}");
    expect(html).toContain("<math");
    expect(html).toContain("<msqrt>");
    expect(html).toContain('<annotation encoding="application/x-tex">\\sqrt{\\tfrac{2}{15}}</annotation>');
  });

  it("sets many thin spaces, which cost no expansion", () => {
    expect(source(typeset("a\\,b".repeat(60)))).toBe(false);
    expect(source(typeset("\\\\,x"))).toBe(false);
  });

  it("lets our own long sums through, within the wider limits", () => {
    const sum = Array.from({ length: 700 }, (_, k) => `${k}`).join("+");
    expect(sum.length).toBeGreaterThan(TYPESET_LIMITS.characters);
    expect(source(typeset(sum))).toBe(true);
    expect(source(typeset(sum, { own: true }))).toBe(false);
    expect(source(typeset(`\\def\\a{x}\\a`, { own: true }))).toBe(true);
  });

  it("gives the same HTML from the cache, inline and display apart", () => {
    expect(typeset("x^2")).toBe(typeset("x^2"));
    expect(typeset("x^2", { display: true })).not.toBe(typeset("x^2"));
  });

  it("keeps the cache inside its bytes", () => {
    for (let i = 0; i < 1_500; i += 1) typeset(`\\frac{${i}}{\\sqrt{${i + 1}}}`);
    expect(typesetCacheBytes()).toBeGreaterThan(0);
    expect(typesetCacheBytes()).toBeLessThanOrEqual(TYPESET_LIMITS.cacheBytes);
    expect(source(typeset("\\frac{0}{\\sqrt{1}}"))).toBe(false);
  });
});

describe("statements", () => {
  it("sets formulas and escapes the prose between them", () => {
    const html = typesetText("Let $j<3$ & \\(m = 0\\) <b>now</b>");
    expect(html.match(/class="katex"/g)).toHaveLength(2);
    expect(html).toContain("&amp;");
    expect(html).toContain("&lt;b&gt;now&lt;/b&gt;");
  });

  it("sets a display formula on a line of its own", () => {
    expect(typesetText("So $$x=1$$")).toContain("katex-display");
    expect(typesetText("So \\[x=1\\]")).toContain("katex-display");
  });

  it("leaves an escaped or a lonely dollar sign alone", () => {
    expect(typesetText("costs \\$5 and $6")).toBe("costs $5 and $6");
  });

  it("reads emphasis, dashes, quotation marks and ties", () => {
    expect(typesetText("\\emph{odd} -- ``so'' 5~eV")).toBe("<em>odd</em> – “so” 5\u00a0eV");
  });

  it("shows an unreadable formula as source and sets the next", () => {
    const html = typesetText("$\\frac{1$ then $x$");
    expect(html).toContain("math-source");
    expect(html).toContain('class="katex"');
  });

  it("shows formulas past the limit as written", () => {
    const html = typesetText("$x$ ".repeat(230));
    expect(html.match(/class="katex"/g)).toHaveLength(200);
    expect(html).toContain("$x$");
  });
});
