import { AppError } from "@/lib/errors";
import { SOURCE_LIMITS } from "./limits";

const UNSEEN = /[\u0000-\u001f\u007f-\u009f\u200b-\u200f\u061c\u2028-\u202e\u2060-\u2069\ufeff]/g;

/**
 * The author's name for a file, fit to be shown: the part after the last slash of either kind, without what cannot
 * be seen. It is only ever text: nothing on the server is opened by it.
 * @throws AppError invalid when nothing is left, or the name does not end in .csv or .json
 */
export function cleanFileName(given: string): string {
  if (given.includes("\0"))
    throw new AppError("invalid", "The file's name contains a NUL character; rename the file.");
  const last = given.split(/[/\\]/).at(-1) ?? "";
  const name = last
    .replace(/\p{Cs}/gu, "")
    .normalize("NFC")
    .replace(UNSEEN, "")
    .trim();
  const ending = SOURCE_LIMITS.endings.find((each) => name.toLowerCase().endsWith(each));
  if (!ending)
    throw new AppError("invalid", `A key file ends in .csv or .json; “${shortened(name, 60)}” does not.`, {
      fields: { name: ["Choose a file that ends in .csv or .json"] },
    });
  const stem = name.slice(0, -ending.length);
  return stem === ""
    ? `key${name}`
    : [...stem]
        .slice(0, 200)
        .join("")
        .slice(0, SOURCE_LIMITS.name - ending.length) + name.slice(-ending.length);
}

const shortened = (text: string, most: number) =>
  [...text].length > most ? `${[...text].slice(0, most).join("")}…` : text;

/**
 * A Content-Disposition header (RFC 6266) that makes a browser save and never show: a plain ASCII name for old
 * programs and the whole name as UTF-8, at most 255 bytes of it.
 */
export function attachment(name: string): string {
  const whole = cut(
    name
      .replace(UNSEEN, "")
      .replace(/[/\\]/g, "_")
      .replace(/\p{Cs}/gu, ""),
    SOURCE_LIMITS.name,
  );
  const plain = whole.replace(/[^\x20-\x7e]|["\\%;]/g, "_");
  const encoded = encodeURIComponent(whole).replace(
    /['()*!]/g,
    (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`;
}

/** The longest beginning of `name` before its ending that fits into so many bytes of UTF-8, with the ending. */
function cut(name: string, bytes: number): string {
  const ending = /\.[a-z]{1,5}$/i.exec(name)?.[0] ?? "";
  const stem = [...name.slice(0, name.length - ending.length)];
  while (stem.length > 0 && Buffer.byteLength(stem.join("") + ending) > bytes) stem.pop();
  return stem.join("") + ending;
}
