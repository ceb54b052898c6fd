import { escapeHtml, typeset } from "@/lib/typeset/typeset";

/** How much of one statement is set; beyond it the text is shown as it was written. */
export const TEXT_LIMITS = { characters: 20_000, formulas: 200 } as const;

// `\$` is a dollar sign; otherwise $$…$$, \[…\], $…$ or \(…\), none of them across a blank line.
const FORMULA =
  /\\\\|\\\$|\$\$((?:[^$\\]|\\[^])+?)\$\$|\\\[((?:(?!\\\])[^])+?)\\\]|\$((?:[^$\\]|\\[^])+?)\$|\\\(((?:(?!\\\))[^])+?)\\\)/g;

/** Prose in LaTeX's plainest conventions: emphasis, dashes, quotation marks, ties, paragraphs. The rest as written. */
function prose(text: string): string {
  return escapeHtml(text)
    .replace(/\\(?:emph|textit)\{([^{}]*)\}/g, "<em>$1</em>")
    .replace(/\\textbf\{([^{}]*)\}/g, "<strong>$1</strong>")
    .replace(/\\([%&#_{}])/g, "$1")
    .replace(/\\&amp;/g, "&amp;")
    .replace(/---/g, "—")
    .replace(/--/g, "–")
    .replace(/``/g, "“")
    .replace(/&#39;&#39;/g, "”")
    .replace(/~/g, "\u00a0")
    .replace(/(?:\r?\n[ \t]*){2,}/g, '<span class="statement-break"></span>');
}

/**
 * Sets a statement: prose with formulas between `$…$`, `\(…\)`, `$$…$$` or `\[…\]`.
 * Prose is escaped, formulas go through `typeset` with its limits; never throws, and the result is safe in a page.
 */
export function typesetText(text: string): string {
  if (text.length > TEXT_LIMITS.characters) return escapeHtml(text);
  let html = "";
  let at = 0;
  let formulas = 0;
  for (const found of text.matchAll(FORMULA)) {
    html += prose(text.slice(at, found.index));
    at = found.index + found[0].length;
    const display = found[1] ?? found[2];
    const inline = found[3] ?? found[4];
    if (found[0] === "\\$") html += "$";
    else if (found[0] === "\\\\") html += "<br>";
    else if (++formulas > TEXT_LIMITS.formulas) html += escapeHtml(found[0]);
    else if (display !== undefined)
      html += `<span class="math-block">${typeset(display, { display: true })}</span>`;
    else if (inline !== undefined) html += `<span class="math-inline">${typeset(inline)}</span>`;
  }
  return html + prose(text.slice(at));
}
