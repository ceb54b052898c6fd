import type { Exported, KeyClaim, KeyContent } from "@/lib/keys/key-content";

const SPECIAL: Record<string, string> = {
  "\\": "\\textbackslash{}",
  "{": "\\{",
  "}": "\\}",
  $: "\\$",
  "&": "\\&",
  "#": "\\#",
  _: "\\_",
  "%": "\\%",
  "^": "\\textasciicircum{}",
  "~": "\\textasciitilde{}",
  "<": "\\textless{}",
  ">": "\\textgreater{}",
  "|": "\\textbar{}",
};

/** A person's text for LaTeX: no character of it is a command, and it stays on its line. */
export function latexText(text: string): string {
  return text
    .replace(/\s+/g, " ")
    .replace(/[\\{}$&#_%^~<>|]/g, (character) => SPECIAL[character] ?? character);
}

/**
 * The answers by chapter as a LaTeX file that compiles alone and can be put into a book: with `\SurdmarkInside` defined it
 * leaves out its preamble and ends before `\end{document}`. Needs only amsmath and textcomp.
 */
export function keyAsLatex(content: KeyContent, sha256: string, made: Exported): string {
  const { work, number, frozenAt, frozenBy } = content;
  const comment = (text: string) => `% ${text.replace(/\s+/g, " ")}`;
  return [
    comment(`${work.title}: answers, frozen key ${number}`),
    comment(
      `frozen ${frozenAt} by ${frozenBy}; ${content.claims.length} answers; recomputed by ${content.engine}`,
    ),
    comment(`SHA-256 of the key's canonical JSON: ${sha256}`),
    comment(`exported ${made.at} by ${made.by}`),
    "%",
    "% Compiles alone. To put it into a book that loads amsmath and textcomp:",
    "%   \\newcommand{\\SurdmarkInside}{}",
    "%   \\input{this-file}",
    "\\ifdefined\\SurdmarkInside\\else",
    "\\documentclass{article}",
    "\\usepackage[T1]{fontenc}",
    "\\usepackage[utf8]{inputenc}",
    "\\usepackage{amsmath,textcomp}",
    `\\title{${latexText(work.title)}\\\\\\large Answers}`,
    `\\author{frozen key ${number}}`,
    `\\date{${frozenAt.slice(0, 10)}}`,
    "\\begin{document}",
    "\\maketitle",
    "\\fi",
    ...content.chapters.flatMap((chapter) => {
      const claims = content.claims.filter((claim) => claim.chapter === chapter.number);
      return claims.length === 0
        ? []
        : [
            "",
            `\\section*{Chapter ${latexText(chapter.number)}. ${latexText(chapter.title)}}`,
            "\\begin{description}",
            ...claims.map(answerLine),
            "\\end{description}",
          ];
    }),
    "",
    "\\ifdefined\\SurdmarkInside\\expandafter\\endinput\\fi",
    "\\end{document}",
    "",
  ].join("\n");
}

/** One answer; what was let stand or waived says so in a footnote, with the convention it relies on. */
function answerLine(claim: KeyClaim): string {
  const quantity = claim.quantityLatex
    ? `$${claim.quantityLatex}$`
    : `\\texttt{${latexText(claim.quantity)}}`;
  const answer = claim.answer.latex ? `$${claim.answer.latex}$` : `\\texttt{${latexText(claim.answer.text)}}`;
  return `\\item[${latexText(claim.ref)}] ${quantity} $=$ ${answer}${footnote(claim)}`;
}

function footnote({ settlement, waiver }: KeyClaim): string {
  if (waiver)
    return `\\footnote{Not decided by the verification; waived by ${latexText(waiver.by)}: ${latexText(waiver.reason)}}`;
  if (settlement?.word !== "stet") return "";
  const relies = settlement.convention ? ` (${latexText(settlement.convention)})` : "";
  return `\\footnote{Stet${relies}: ${latexText(settlement.reason ?? "")}}`;
}
