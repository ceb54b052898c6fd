import { createHash } from "node:crypto";
import { readCsv } from "./csv";
import { decodeKeyFile } from "./decode";
import { readJson } from "./json";
import { KEY_FILE_LIMITS, UnusableFile, type KeyFile, type KeyFileError } from "./key-file";

export { KEY_FILE_LIMITS, type KeyFile, type KeyFileError, type KeyRow } from "./key-file";

/**
 * Reads the bytes of an answer key. The name only tells CSV from JSON. Never throws on what the bytes hold: a file that
 * cannot be used has errors and no rows, a row that cannot be used has an error at its line and column.
 */
export function readKeyFile(name: string, bytes: Uint8Array): KeyFile {
  const sha256 = createHash("sha256").update(bytes).digest("hex");
  const format = /\.json$/i.test(name) ? "json" : "csv";
  const empty: KeyFile = { format, conventions: null, rows: [], errors: [], notices: [], sha256 };
  try {
    const { text, notices } = decodeKeyFile(bytes);
    if (format === "json") {
      const { conventions, rows, errors } = readJson(text);
      return { ...empty, conventions, rows, errors: shortened(errors), notices };
    }
    if (/^\s*[{[]/.test(text) && /"claims"/.test(text.slice(0, 4_000))) {
      throw new UnusableFile({
        line: 1,
        column: 1,
        says: "This looks like a JSON key; give the file a name that ends in .json.",
      });
    }
    const csv = readCsv(text);
    return { ...empty, rows: csv.rows, errors: shortened(csv.errors), notices: [...notices, ...csv.notices] };
  } catch (error) {
    if (error instanceof UnusableFile) return { ...empty, errors: [error.at] };
    throw error;
  }
}

function shortened(errors: KeyFileError[]): KeyFileError[] {
  const rest = errors.length - KEY_FILE_LIMITS.errors;
  if (rest <= 0) return errors;
  const last = errors[KEY_FILE_LIMITS.errors] as KeyFileError;
  return [
    ...errors.slice(0, KEY_FILE_LIMITS.errors),
    {
      line: last.line,
      column: last.column,
      says: `${rest.toLocaleString("en-GB")} further errors are not listed.`,
    },
  ];
}
