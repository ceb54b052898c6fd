import { readKeyFile, type KeyFileError } from "@/lib/key-files/read-key-file";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import type { Finding } from "@/lib/verify/finding";
import { verifyClaim } from "@/lib/verify/verify-claim";
import { withContradictions, type Summary } from "@/lib/verify/verify-key";

export type NamedBytes = { name: string; bytes: Uint8Array };
export type FileFault = KeyFileError & { file: string };
export type FilesReport = {
  findings: Finding[];
  summary: Summary;
  /** What in the files could not be used; with any of them the check is not complete. */
  faults: FileFault[];
  notices: { file: string; says: string }[];
};

/**
 * Verifies the claims of several key files, each by its own conventions, and compares them all with each other. Each
 * finding carries its place.
 */
export function checkFiles(files: readonly NamedBytes[]): FilesReport {
  const findings: Finding[] = [];
  const faults: FileFault[] = [];
  const notices: FilesReport["notices"] = [];
  for (const { name, bytes } of files) {
    const key = readKeyFile(name, bytes);
    const conventions = { ...DEFAULT_CONVENTIONS, ...key.conventions };
    faults.push(...key.errors.map((error) => ({ file: name, ...error })));
    notices.push(...key.notices.map((says) => ({ file: name, says })));
    for (const { ref, quantity, claimed, line, column } of key.rows) {
      const finding = verifyClaim({ ref, quantity, claimed }, conventions);
      findings.push({ ...finding, place: { file: name, line, column } });
    }
  }
  return { ...withContradictions(findings), faults, notices };
}
