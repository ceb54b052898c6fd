import { audit } from "@/lib/audit";
import type { SessionUser } from "@/lib/auth/user";
import { keyAsCsv } from "@/lib/keys/export-csv";
import { keyAsJson } from "@/lib/keys/export-json";
import { keyAsLatex } from "@/lib/keys/export-latex";
import { getKey } from "@/lib/keys/get-key";
import type { Exported } from "@/lib/keys/key-content";
import type { KeyFormat } from "@/lib/keys/schema";
import { transact } from "@/lib/transact";

export type KeyExport = { body: string; contentType: string; fileName: string };

const FORMATS = {
  json: { write: keyAsJson, contentType: "application/json; charset=utf-8", ending: "json" },
  csv: { write: keyAsCsv, contentType: "text/csv; charset=utf-8; header=present", ending: "csv" },
  latex: { write: keyAsLatex, contentType: "application/x-tex; charset=utf-8", ending: "tex" },
} as const;

/**
 * A frozen key as a file. Written into the audit of the work.
 * @throws AppError not_found as for reading the key
 */
export async function exportKey(
  workId: string,
  number: number,
  format: KeyFormat,
  user: SessionUser,
): Promise<KeyExport> {
  const key = await getKey(workId, number, user);
  const made: Exported = { by: user.name, at: new Date().toISOString() };
  const { write, contentType, ending } = FORMATS[format];
  const body = write(key.content, key.sha256, made);
  await transact((transaction) =>
    audit(transaction, {
      workId,
      actorId: user.id,
      action: "key.export",
      subjectType: "key",
      subjectId: String(number),
      after: { number, format, sha256: key.sha256 },
    }),
  );
  return { body, contentType, fileName: `${slug(key.content.work.title)}-key-${number}.${ending}` };
}

/** A name that every file system takes: plain letters, digits and hyphens. */
function slug(title: string): string {
  const plain = title
    .normalize("NFKD")
    .replace(/\p{M}/gu, "")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "-")
    .slice(0, 60)
    .replace(/^-+|-+$/g, "");
  return plain === "" ? "work" : plain;
}
