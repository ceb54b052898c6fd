import katex from "katex";

/**
 * What the typesetter accepts of a text that a person wrote. KaTeX at its defaults can be made to run for seconds or
 * to fill memory by a few thousand characters, so length, nesting and expansion are bounded before it starts.
 */
export const TYPESET_LIMITS = {
  characters: 2_000,
  ownCharacters: 40_000,
  nesting: 40,
  cells: 200,
  expansions: 20,
  ownExpansions: 2_000,
  emSize: 20,
  html: 512 * 1024,
  ownHtml: 4 * 1024 * 1024,
  cacheBytes: 8 * 1024 * 1024,
} as const;

export type TypesetOptions = {
  /** Set on a line of its own. */
  display?: boolean;
  /** The LaTeX was written by our own engine, so it may be longer (a sum of many terms). Never for a person's text. */
  own?: boolean;
};

// Commands that define, redefine or delay macros, reach outside the formula, or carry markup of their own.
const REFUSED = new Set(
  (
    "def gdef edef xdef let futurelet global long outer newcommand renewcommand providecommand newenvironment " +
    "renewenvironment DeclareMathOperator csname endcsname expandafter noexpand loop repeat input include read write " +
    "openout immediate catcode message errmessage show href url includegraphics htmlClass htmlId htmlStyle htmlData " +
    "require mathchoice"
  ).split(" "),
);

// Each of these would count as one or two expansions; as primitives they count as none.
const SPACES: Record<string, string> = {
  "\\,": "\\mskip3mu ",
  "\\:": "\\mskip4mu ",
  "\\>": "\\mskip4mu ",
  "\\;": "\\mskip5mu ",
  "\\!": "\\mskip-3mu ",
  "\\quad": "\\hskip1em ",
  "\\qquad": "\\hskip2em ",
};

const OPENS = new Set(["{", "\\left", "\\begin", "\\bgroup", "\\begingroup"]);
const CLOSES = new Set(["}", "\\right", "\\end", "\\egroup", "\\endgroup"]);
// Commands that nest without a brace: `\sqrt\sqrt\sqrt x`, `x^x^x` (the latter is an error anyway).
const PREFIX =
  /^\\(?:sqrt|frac|[dtc]frac|binom|[dt]binom|overline|underline|hat|bar|vec|tilde|dot|ddot|mathbf|mathrm|mathit|boldsymbol|text|not)$/;
const TOKEN = /\\(?:[a-zA-Z@]+\*?|[\s\S])|[{}]|[^\\{}]/gu;

/**
 * Looks the text over before KaTeX sees it.
 * @returns the reason why it is not set, or null and the text with its spaces as primitives.
 */
function prepare(latex: string, own: boolean): { refused: string } | { latex: string } {
  const limit = own ? TYPESET_LIMITS.ownCharacters : TYPESET_LIMITS.characters;
  if (latex.length > limit) return { refused: `longer than ${limit} characters` };
  let depth = 0;
  let prefixes = 0;
  let cells = 0;
  let out = "";
  for (const token of latex.match(TOKEN) ?? []) {
    if (token.startsWith("\\") && REFUSED.has(token.slice(1).replace(/\*$/, "")))
      return { refused: `${token} is not set here` };
    if (OPENS.has(token)) depth += 1;
    if (CLOSES.has(token)) depth -= 1;
    if (PREFIX.test(token)) prefixes += 1;
    else if (token !== " ") prefixes = 0;
    if (!own && (token === "&" || token === "\\\\") && ++cells > TYPESET_LIMITS.cells)
      return { refused: "too many cells" };
    if (depth > TYPESET_LIMITS.nesting || prefixes > TYPESET_LIMITS.nesting)
      return { refused: "nested too deeply" };
    out += SPACES[token] ?? token;
  }
  return { latex: out };
}

// Least recently used first: a Map keeps the order in which its keys were last set.
const cache = new Map<string, string>();
let cached = 0;

function remember(key: string, html: string): string {
  const bytes = 2 * (key.length + html.length);
  if (bytes > TYPESET_LIMITS.cacheBytes / 8) return html;
  cache.set(key, html);
  cached += bytes;
  for (const [oldKey, oldHtml] of cache) {
    if (cached <= TYPESET_LIMITS.cacheBytes) break;
    cache.delete(oldKey);
    cached -= 2 * (oldKey.length + oldHtml.length);
  }
  return html;
}

/** Escapes text for HTML, in content and in a quoted attribute. */
export function escapeHtml(text: string): string {
  return text.replace(
    /[&<>"']/g,
    (c) => ({ "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;", "'": "&#39;" })[c] ?? c,
  );
}

/** The source of a formula that was not set, with the reason as its title. */
function asSource(latex: string, reason: string): string {
  const limit = TYPESET_LIMITS.characters;
  const shown = latex.length > limit ? `${latex.slice(0, limit)} …` : latex;
  return `<code class="math-source" title="${escapeHtml(`Shown as source: ${reason}`)}">${escapeHtml(shown)}</code>`;
}

/**
 * Sets LaTeX as HTML with MathML beside it for assistive technology. It never throws: what cannot be set within
 * TYPESET_LIMITS comes back as escaped source. The result is safe to put into a page.
 * @param latex the formula, without `$`
 * @returns HTML, from a cache bounded in bytes where it was set before
 */
export function typeset(latex: string, { display = false, own = false }: TypesetOptions = {}): string {
  const key = `${display ? "d" : "i"}${own ? "o" : "u"}${latex}`;
  const known = cache.get(key);
  if (known !== undefined) {
    cache.delete(key);
    cache.set(key, known);
    return known;
  }
  const ready = prepare(latex, own);
  if ("refused" in ready) return asSource(latex, ready.refused);
  let html: string;
  try {
    html = katex.renderToString(ready.latex, {
      displayMode: display,
      output: "htmlAndMathml",
      throwOnError: true,
      strict: false,
      trust: false,
      macros: {},
      globalGroup: false,
      maxExpand: own ? TYPESET_LIMITS.ownExpansions : TYPESET_LIMITS.expansions,
      maxSize: TYPESET_LIMITS.emSize,
    });
  } catch {
    // KaTeX's own messages quote the input as HTML, so they are not shown.
    return remember(key, asSource(latex, "this LaTeX could not be read"));
  }
  if (html.length > (own ? TYPESET_LIMITS.ownHtml : TYPESET_LIMITS.html))
    return remember(key, asSource(latex, "too large when set"));
  return remember(key, html);
}

/** How many bytes of set formulas are kept now (for the tests and for the health page). */
export function typesetCacheBytes(): number {
  return cached;
}
