import { KEY_FILE_LIMITS, UnusableFile } from "./key-file";

const SIGNATURES: readonly { name: string; bytes: readonly number[] }[] = [
  { name: "a PNG picture", bytes: [0x89, 0x50, 0x4e, 0x47] },
  { name: "a JPEG picture", bytes: [0xff, 0xd8, 0xff] },
  { name: "a GIF picture", bytes: [0x47, 0x49, 0x46, 0x38] },
  { name: "a PDF document", bytes: [0x25, 0x50, 0x44, 0x46, 0x2d] },
  { name: "a ZIP archive or a spreadsheet workbook", bytes: [0x50, 0x4b, 0x03, 0x04] },
  { name: "a ZIP archive", bytes: [0x50, 0x4b, 0x05, 0x06] },
  { name: "a gzip archive", bytes: [0x1f, 0x8b] },
  { name: "a program (ELF)", bytes: [0x7f, 0x45, 0x4c, 0x46] },
  { name: "an older office document", bytes: [0xd0, 0xcf, 0x11, 0xe0] },
];

/**
 * The text of a key file, which must be UTF-8 (a byte order mark is allowed and noted).
 * @throws UnusableFile naming what the bytes are instead
 */
export function decodeKeyFile(bytes: Uint8Array): { text: string; notices: string[] } {
  const refuse = (says: string): never => {
    throw new UnusableFile({ line: 1, column: 1, says });
  };
  if (bytes.length === 0) refuse("The file is empty.");
  if (bytes.length > KEY_FILE_LIMITS.bytes) {
    refuse(
      `The file has ${bytes.length.toLocaleString("en-GB")} bytes; at most ${KEY_FILE_LIMITS.bytes.toLocaleString("en-GB")} (2 MiB) are read.`,
    );
  }
  const known = SIGNATURES.find((each) => each.bytes.every((byte, n) => bytes[n] === byte));
  if (known) refuse(`This is ${known.name}, not a CSV or JSON key in UTF-8.`);
  const wide = wideEncoding(bytes);
  if (wide) refuse(`The file is in ${wide}; save it as UTF-8.`);
  const text = strictText(bytes);
  const nul = text.indexOf("\0");
  if (nul >= 0) {
    throw new UnusableFile({
      ...placeOf(text, nul),
      says: "A NUL byte stands here; the file is not plain text.",
    });
  }
  const notices = text.startsWith("\uFEFF") ? ["A byte order mark at the start was recognised."] : [];
  const plain = text.startsWith("\uFEFF") ? text.slice(1) : text;
  if (plain.trim() === "") refuse("The file is empty.");
  if (plain.includes("\r\n")) notices.push("Windows line ends (CR LF) were recognised.");
  return { text: plain, notices };
}

function wideEncoding(bytes: Uint8Array): string | null {
  const [a, b] = bytes;
  if (a === 0xff && b === 0xfe) return "UTF-16 (little endian)";
  if (a === 0xfe && b === 0xff) return "UTF-16 (big endian)";
  // Without a mark: every second byte of plain text is 0.
  const sample = bytes.subarray(0, 64);
  if (sample.length < 8 || sample.length % 2 !== 0) return null;
  const zeros = (parity: number) => sample.filter((byte, n) => n % 2 === parity && byte === 0).length;
  if (zeros(1) > sample.length * 0.4 && zeros(0) === 0) return "UTF-16 (little endian)";
  if (zeros(0) > sample.length * 0.4 && zeros(1) === 0) return "UTF-16 (big endian)";
  return null;
}

function strictText(bytes: Uint8Array): string {
  try {
    return new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    const at = firstBadByte(bytes);
    const before = new TextDecoder("utf-8").decode(bytes.subarray(0, at));
    const byte = (bytes[at] ?? 0).toString(16).toUpperCase().padStart(2, "0");
    throw new UnusableFile({
      ...placeOf(before, before.length),
      says: `The byte ${byte} here is not UTF-8; the file is probably in Latin-1 or a Windows code page. Save it as UTF-8.`,
    });
  }
}

/** Offset of the first byte that cannot be UTF-8, found by halving. */
function firstBadByte(bytes: Uint8Array): number {
  const good = (end: number) => {
    try {
      new TextDecoder("utf-8", { fatal: true }).decode(bytes.subarray(0, end), { stream: true });
      return true;
    } catch {
      return false;
    }
  };
  let [low, high] = [0, bytes.length];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (good(middle)) low = middle;
    else high = middle;
  }
  // The byte that breaks it may be a good one after the bad: go back to where its character would begin.
  for (let back = 1; back <= 3 && back <= low; back += 1) {
    const lead = bytes[low - back] ?? 0;
    if (lead < 0x80) break;
    if (lead >= 0xc0) return needs(lead) > back ? low - back : low;
  }
  return low;
}

/** How many bytes a character takes that begins with this one. */
const needs = (lead: number) => (lead >= 0xf0 ? 4 : lead >= 0xe0 ? 3 : 2);

/** Line and column (both from 1, columns in UTF-16 units) of an offset. */
export function placeOf(text: string, offset: number): { line: number; column: number } {
  let line = 1;
  let start = 0;
  for (let n = text.indexOf("\n"); n >= 0 && n < offset; n = text.indexOf("\n", n + 1)) {
    line += 1;
    start = n + 1;
  }
  return { line, column: offset - start + 1 };
}
