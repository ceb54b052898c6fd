import type { Conventions } from "@/lib/verify/conventions";

/** One claim of a key file, with the place at which it stands. */
export type KeyRow = {
  ref: string;
  quantity: string;
  claimed: string;
  note: string | null;
  problem: string | null;
  page: string | null;
  line: number;
  column: number;
};

/** Why a file or a row of it cannot be used. `pointer` is an RFC 6901 JSON Pointer, in JSON files. */
export type KeyFileError = { line: number; column: number; says: string; pointer?: string };

export type KeyFile = {
  format: "csv" | "json";
  conventions: Partial<Conventions> | null;
  rows: KeyRow[];
  errors: KeyFileError[];
  /** What was recognised and needs no action: a byte order mark, semicolons, line ends. */
  notices: string[];
  sha256: string;
};

/** Limits of a key file; past them it is refused whole. */
export const KEY_FILE_LIMITS = {
  bytes: 2 * 1024 * 1024,
  rows: 20_000,
  cell: 4_000,
  columns: 64,
  /** Errors that are listed before the rest is only counted. */
  errors: 200,
  /** Depth of a JSON file. */
  depth: 16,
} as const;

/** Thrown inside the readers for what makes the whole file unusable. */
export class UnusableFile extends Error {
  readonly at: KeyFileError;
  constructor(at: KeyFileError) {
    super(at.says);
    this.at = at;
  }
}
