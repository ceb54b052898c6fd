/** First bytes of what people upload by mistake, each with what to say of it. */
const FIRST_BYTES: readonly { bytes: readonly number[]; says: string }[] = [
  { bytes: [0x89, 0x50, 0x4e, 0x47], says: "This is a PNG picture." },
  { bytes: [0xff, 0xd8, 0xff], says: "This is a JPEG picture." },
  { bytes: [0x47, 0x49, 0x46, 0x38], says: "This is a GIF picture." },
  { bytes: [0x25, 0x50, 0x44, 0x46, 0x2d], says: "This is a PDF document." },
  {
    bytes: [0x50, 0x4b, 0x03, 0x04],
    says: "This is a ZIP archive or a spreadsheet workbook. Save the sheet as CSV (UTF-8) and upload that.",
  },
  { bytes: [0x50, 0x4b, 0x05, 0x06], says: "This is an empty ZIP archive." },
  {
    bytes: [0xd0, 0xcf, 0x11, 0xe0],
    says: "This is an old spreadsheet or text document. Save it as CSV (UTF-8) and upload that.",
  },
  { bytes: [0x1f, 0x8b], says: "This is a gzip archive. Unpack it and upload the file inside." },
  { bytes: [0x7f, 0x45, 0x4c, 0x46], says: "This is a program, not a key." },
  { bytes: [0xff, 0xfe], says: "This is text in UTF-16. Save it as UTF-8 and upload that." },
  { bytes: [0xfe, 0xff], says: "This is text in UTF-16. Save it as UTF-8 and upload that." },
];

/**
 * What a file is when it cannot be a key, as a sentence; null when it may be one. Goes by the bytes alone, never by
 * the name or the type that the browser sends.
 */
export function notAKey(bytes: Uint8Array): string | null {
  if (bytes.length === 0) return "The file is empty.";
  const known = FIRST_BYTES.find((each) => each.bytes.every((byte, i) => bytes[i] === byte));
  if (known) return known.says;
  const nul = bytes.indexOf(0);
  if (nul < 0) return null;
  return looksLikeUtf16(bytes)
    ? "This is text in UTF-16. Save it as UTF-8 and upload that."
    : `Byte ${nul + 1} of the file is NUL, which no text contains; this is not a CSV or JSON file.`;
}

/** Text in Latin script has a NUL in every second byte. */
function looksLikeUtf16(bytes: Uint8Array): boolean {
  const sample = bytes.subarray(0, 400);
  const nuls = [0, 0];
  sample.forEach((byte, i) => {
    if (byte === 0) nuls[i % 2] = (nuls[i % 2] ?? 0) + 1;
  });
  return nuls.some((count) => count > sample.length / 5);
}
