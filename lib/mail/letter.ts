/** A mail before it is set: a few paragraphs, one link that leads on, and why it was sent. */
export type Letter = {
  subject: string;
  /** Plain sentences; each becomes a paragraph. */
  paragraphs: string[];
  link: { label: string; href: string };
  /** A last line in small type. */
  because: string;
};

export type SetLetter = { subject: string; text: string; html: string };

/** Sets a letter as plain text and as HTML. Everything in it is text: no name can bring in markup or another line. */
export function setLetter(letter: Letter): SetLetter {
  const subject = oneLine(letter.subject);
  const paragraphs = letter.paragraphs.map(oneLine);
  const because = oneLine(letter.because);
  const { label, href } = letter.link;
  return {
    subject,
    text: [...paragraphs, `${label}:\n${href}`, `-- \n${because}`].join("\n\n") + "\n",
    html: page(
      subject,
      [
        ...paragraphs.map((text) => `<p style="margin:0 0 16px">${escapeHtml(text)}</p>`),
        `<p style="margin:24px 0"><a class="go" href="${escapeHtml(href)}" style="${BUTTON}">${escapeHtml(label)}</a></p>`,
        `<p class="quiet" style="${SMALL};word-break:break-all">${escapeHtml(href)}</p>`,
        `<p class="quiet" style="${SMALL};margin-top:24px">${escapeHtml(because)}</p>`,
      ].join("\n"),
    ),
  };
}

/** Control and direction characters out, runs of space to one: a name cannot start a line or a header of its own. */
export function oneLine(text: string): string {
  return text
    .replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]/gu, " ")
    .replace(/\s+/g, " ")
    .trim();
}

const ENTITIES: Record<string, string> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};
const escapeHtml = (text: string) => text.replace(/[&<>"']/g, (c) => ENTITIES[c] ?? c);

// The colours of the product's paper and ink, by day and by night; mail programs know no style sheet of ours.
const BUTTON =
  "display:inline-block;padding:12px 20px;background:#221c14;color:#fbf7ee;text-decoration:none;font-family:sans-serif;font-size:16px;border:1px solid #857760";
const SMALL = "margin:0 0 8px;color:#5c5140;font-family:sans-serif;font-size:13px;line-height:1.45";

function page(title: string, body: string): string {
  return `<!doctype html>
<html lang="en-GB">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width,initial-scale=1">
<meta name="color-scheme" content="light dark">
<meta name="supported-color-schemes" content="light dark">
<title>${escapeHtml(title)}</title>
<style>
@media (prefers-color-scheme: dark) {
  body, .sheet { background: #1d1913 !important; color: #ede4d3 !important; }
  .quiet { color: #b5a993 !important; }
  .go { background: #ede4d3 !important; color: #1d1913 !important; }
}
</style>
</head>
<body style="margin:0;background:#fbf7ee;color:#221c14">
<div class="sheet" style="max-width:34em;margin:0 auto;padding:28px 16px;font-family:Georgia,'Times New Roman',serif;font-size:17px;line-height:1.5">
<p style="margin:0 0 20px;padding-bottom:8px;border-bottom:2px solid currentColor;font-size:18px">Surdmark</p>
${body}
</div>
</body>
</html>
`;
}
