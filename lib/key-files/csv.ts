import { CsvError, parse } from "csv-parse/sync";
import { placeOf } from "./decode";
import { KEY_FILE_LIMITS, UnusableFile, type KeyFileError, type KeyRow } from "./key-file";

const NEEDED = ["ref", "quantity", "claimed"] as const;
const OPTIONAL = ["note", "problem", "page"] as const;
type ColumnName = (typeof NEEDED)[number] | (typeof OPTIONAL)[number];
const COLUMNS: readonly string[] = [...NEEDED, ...OPTIONAL];

type Parsed = { record: string[]; info: { lines: number; bytes: number; invalid_field_length: number } };

/**
 * The rows of a CSV key (RFC 4180; semicolons instead of commas are recognised), and an error for each row that
 * cannot be used.
 * @throws UnusableFile when the header or the quoting makes the whole file unusable
 */
export function readCsv(text: string): { rows: KeyRow[]; errors: KeyFileError[]; notices: string[] } {
  const notices: string[] = [];
  const delimiter = delimiterOf(text);
  if (delimiter === ";") notices.push("Semicolons between the columns were recognised.");
  const records = recordsOf(text, delimiter);
  const [header, ...body] = records;
  if (!header) throw new UnusableFile({ line: 1, column: 1, says: "The file is empty." });
  const columns = columnsOf(header, delimiter);
  if (body.length > KEY_FILE_LIMITS.rows) {
    throw new UnusableFile({
      line: header.line + 1,
      column: 1,
      says: `The file has ${body.length.toLocaleString("en-GB")} rows; at most ${KEY_FILE_LIMITS.rows.toLocaleString("en-GB")} are read.`,
    });
  }
  if (body.length === 0) {
    throw new UnusableFile({ line: header.line, column: 1, says: "The file has a header but no claims." });
  }
  return { ...rowsOf(body, columns, header.cells.length), notices };
}

type Located = { cells: string[]; line: number };

function recordsOf(text: string, delimiter: string): Located[] {
  try {
    const parsed = parse(text, {
      delimiter,
      info: true,
      relax_column_count: true,
      skip_empty_lines: false,
      max_record_size: 8 * KEY_FILE_LIMITS.cell * 2,
      record_delimiter: ["\r\n", "\n", "\r"],
    }) as unknown as Parsed[];
    const blank = (cells: readonly string[]) => cells.length === 1 && cells[0]?.trim() === "";
    // `lines` tells where a record ends; it begins after the line breaks inside its own quoted cells.
    return parsed
      .map(({ record, info }) => ({ cells: record, line: info.lines - breaksIn(record) }))
      .filter(({ cells }) => !blank(cells));
  } catch (error) {
    if (error instanceof CsvError) throw brokenQuotes(error, text);
    throw error;
  }
}

function breaksIn(record: readonly string[]): number {
  return record.reduce((sum, cell) => sum + (cell.match(/\r\n|\n|\r/g)?.length ?? 0), 0);
}

function brokenQuotes(error: CsvError, text: string): UnusableFile {
  const info = error as CsvError & { lines?: number; column?: number | string; bytes?: number };
  const line = Math.max(1, info.lines ?? 1);
  const lineText = text.split(/\r\n|\n|\r/, line)[line - 1] ?? "";
  const quote = lineText.indexOf('"');
  const column = quote >= 0 ? quote + 1 : 1;
  switch (error.code) {
    case "CSV_QUOTE_NOT_CLOSED": {
      const at = placeOf(text, text.lastIndexOf('"'));
      return new UnusableFile({ ...at, says: "A quotation mark is opened here or before and never closed." });
    }
    case "CSV_INVALID_CLOSING_QUOTE":
      return new UnusableFile({
        line,
        column,
        says: "After a closing quotation mark a separator is expected; a quotation mark inside a cell is doubled.",
      });
    case "INVALID_OPENING_QUOTE":
      return new UnusableFile({
        line,
        column,
        says: "A quotation mark stands inside a cell that is not quoted; quote the whole cell and double the mark.",
      });
    case "CSV_MAX_RECORD_SIZE":
      return new UnusableFile({
        line,
        column: 1,
        says: `This row is longer than any row of a key; a cell has at most ${KEY_FILE_LIMITS.cell.toLocaleString("en-GB")} characters.`,
      });
    default:
      return new UnusableFile({ line, column: 1, says: "This line is not well-formed CSV." });
  }
}

/** The separator of the header line: a semicolon only where it makes the known columns and a comma does not. */
function delimiterOf(text: string): "," | ";" {
  const first = text.split(/\r\n|\n|\r/, 1)[0] ?? "";
  const known = (separator: string) =>
    first.split(separator).filter((cell) => COLUMNS.includes(nameOf(cell))).length;
  return known(";") > known(",") ? ";" : ",";
}

const nameOf = (cell: string) => cell.trim().replace(/^"|"$/g, "").trim().toLowerCase();

function columnsOf(header: Located, delimiter: string): Map<ColumnName, number> {
  const { cells, line } = header;
  const refuse = (index: number, says: string): never => {
    throw new UnusableFile({ line, column: startOfCell(cells, index), says });
  };
  if (cells.length > KEY_FILE_LIMITS.columns) {
    refuse(
      KEY_FILE_LIMITS.columns,
      `The header has ${cells.length.toLocaleString("en-GB")} columns; a key has at most six.`,
    );
  }
  const columns = new Map<ColumnName, number>();
  cells.forEach((cell, index) => {
    const name = nameOf(cell);
    if (!COLUMNS.includes(name)) {
      const near =
        cells.length === 1 && /\t/.test(cell) ? " The columns seem to be separated by tabs; use commas." : "";
      refuse(
        index,
        `The column “${shorten(cell.trim())}” is not known; a key has the columns ref, quantity, claimed and, where wanted, note, problem, page.${near}`,
      );
    }
    if (columns.has(name as ColumnName)) refuse(index, `The column “${name}” stands in the header twice.`);
    columns.set(name as ColumnName, index);
  });
  const missing = NEEDED.filter((name) => !columns.has(name));
  if (missing.length > 0) {
    refuse(
      0,
      `The header lacks the column${missing.length > 1 ? "s" : ""} ${missing.join(", ")}; it reads ref${delimiter}quantity${delimiter}claimed.`,
    );
  }
  return columns;
}

function rowsOf(
  body: readonly Located[],
  columns: ReadonlyMap<ColumnName, number>,
  width: number,
): { rows: KeyRow[]; errors: KeyFileError[] } {
  const rows: KeyRow[] = [];
  const errors: KeyFileError[] = [];
  const seen = new Map<string, number>();
  for (const { cells, line } of body) {
    const complain = (column: number, says: string) => void errors.push({ line, column, says });
    if (cells.length !== width) {
      const hint = cells.length > width ? " A cell that contains the separator must be quoted." : "";
      complain(
        1,
        `This row has ${cells.length} ${cells.length === 1 ? "cell" : "cells"}, and the header has ${width}.${hint}`,
      );
      continue;
    }
    const long = cells.findIndex((cell) => cell.length > KEY_FILE_LIMITS.cell);
    if (long >= 0) {
      complain(
        startOfCell(cells, long),
        `This cell has ${cells[long]?.length.toLocaleString("en-GB")} characters; at most ${KEY_FILE_LIMITS.cell.toLocaleString("en-GB")} are read.`,
      );
      continue;
    }
    const cell = (name: ColumnName) => {
      const index = columns.get(name);
      const value = index === undefined ? "" : (cells[index] ?? "");
      return { value: value.trim(), column: index === undefined ? 1 : startOfCell(cells, index) };
    };
    const empty = NEEDED.find((name) => cell(name).value === "");
    if (empty) {
      complain(cell(empty).column, `The cell “${empty}” is empty.`);
      continue;
    }
    const ref = cell("ref").value;
    const before = seen.get(ref);
    if (before !== undefined) {
      complain(
        cell("ref").column,
        `The ref “${shorten(ref)}” already stands on line ${before}; each claim has a ref of its own.`,
      );
      continue;
    }
    seen.set(ref, line);
    rows.push({
      ref,
      quantity: cell("quantity").value,
      claimed: cell("claimed").value,
      note: cell("note").value || null,
      problem: cell("problem").value || null,
      page: cell("page").value || null,
      line,
      column: cell("quantity").column,
    });
  }
  return { rows, errors };
}

/** Column at which a cell of this record begins, as it would be written with the least quoting. */
function startOfCell(cells: readonly string[], index: number): number {
  const written = (cell: string) =>
    /[",;\n\r]/.test(cell) ? cell.length + 2 + (cell.match(/"/g)?.length ?? 0) : cell.length;
  return cells.slice(0, index).reduce((at, cell) => at + written(cell) + 1, 1);
}

function shorten(text: string): string {
  return text.length > 40 ? `${text.slice(0, 39)}…` : text;
}
