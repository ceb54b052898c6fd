import { readFileSync, statSync } from "node:fs";
import path from "node:path";
import { parseArgs } from "node:util";
import { checkFiles, type NamedBytes } from "@/lib/check/check-files";
import { jsonReport } from "@/lib/check/report-json";
import { junitReport } from "@/lib/check/report-junit";
import { sarifReport } from "@/lib/check/report-sarif";
import { allConfirmed, textReport } from "@/lib/check/report-text";
import { KEY_FILE_LIMITS } from "@/lib/key-files/key-file";

const FORMATS = { text: textReport, json: jsonReport, sarif: sarifReport, junit: junitReport };

const HELP = `Verifies the claims of answer keys: recomputes each value exactly and says what is wrong.

Usage: npm run --silent check -- [--format text|json|sarif|junit] FILE...

FILE is a key in UTF-8:
  .csv   header ref,quantity,claimed and, where wanted, note,problem,page
  .json  {"conventions": {...}, "claims": [{"ref": "7.3(a)", "quantity": "(1 1 2; 0 0 0)", "claimed": "sqrt(2/15)"}]}

Options:
  --format FORMAT   text (the default), json, sarif (2.1.0) or junit, on standard output
  --help            this text

Conventions of a .json key, each with its default first:
  cgOrder       "j1m1j2m2" or "j1j2m1m2", the order in < ... | J M>
  houseForm     "any", "rationalised", "single-root", "root-below" or "signed-square"
  impliedRoot   false or true: a square root is understood over plain fractions
  decimalMark   "." or ","

Exit status: 0 all claims are confirmed, 1 something is not, 2 the check could not run or a file could not be used whole.
Example: npm run --silent check -- --format json chapter7.csv
`;

process.exitCode = main(process.argv.slice(2));

function main(args: string[]): 0 | 1 | 2 {
  const asked = readArguments(args);
  if ("complaint" in asked) {
    say(`${asked.complaint} Try --help.`);
    return 2;
  }
  if (asked.help) {
    process.stdout.write(HELP);
    return 0;
  }
  const files: NamedBytes[] = [];
  let unread = false;
  for (const name of asked.files) {
    const file = readFile(name);
    if ("complaint" in file) {
      say(`${name}: ${file.complaint}`);
      unread = true;
    } else files.push(file);
  }
  if (files.length === 0) return 2;
  const report = checkFiles(files);
  for (const { file, says } of report.notices) say(`${file}: ${says}`);
  for (const { file, line, column, says } of report.faults) say(`${file}:${line}:${column}: ${says}`);
  process.stdout.write(FORMATS[asked.format](report));
  if (unread || report.faults.length > 0) return 2;
  return allConfirmed(report) ? 0 : 1;
}

type Asked = { help: boolean; format: keyof typeof FORMATS; files: string[] };

function readArguments(args: string[]): Asked | { complaint: string } {
  try {
    const { values, positionals } = parseArgs({
      args,
      allowPositionals: true,
      options: {
        format: { type: "string", default: "text" },
        help: { type: "boolean", short: "h", default: false },
      },
    });
    const { format, help } = values;
    if (!(format in FORMATS))
      return { complaint: `The format “${format}” is not known; it is text, json, sarif or junit.` };
    if (!help && positionals.length === 0) return { complaint: "Name at least one .csv or .json file." };
    return { help, format: format as keyof typeof FORMATS, files: positionals };
  } catch (error) {
    const message = error instanceof Error ? (error.message.split(/[.\n]/, 1)[0] ?? "") : "";
    return { complaint: `${message}.` };
  }
}

function readFile(name: string): NamedBytes | { complaint: string } {
  if (!/\.(csv|json)$/i.test(name)) {
    const kind = path.extname(name);
    return {
      complaint: `${kind ? `${kind} files are` : "a file without .csv or .json in its name is"} not read; this edition checks .csv and .json.`,
    };
  }
  try {
    const about = statSync(name);
    if (about.isDirectory()) return { complaint: "this is a folder, not a file." };
    if (about.size > KEY_FILE_LIMITS.bytes) {
      return {
        complaint: `the file has ${about.size.toLocaleString("en-GB")} bytes; at most ${KEY_FILE_LIMITS.bytes.toLocaleString("en-GB")} (2 MiB) are read.`,
      };
    }
    return { name, bytes: readFileSync(name) };
  } catch (error) {
    const code = error instanceof Error && "code" in error ? String(error.code) : "";
    if (code === "ENOENT") return { complaint: "there is no such file." };
    if (code === "EACCES") return { complaint: "the file may not be read." };
    return { complaint: `the file cannot be read (${code || "unknown reason"}).` };
  }
}

function say(sentence: string): void {
  process.stderr.write(`${sentence.replace(/[\p{Cc}\p{Cf}]/gu, "?")}\n`);
}
