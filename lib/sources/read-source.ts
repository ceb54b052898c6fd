import { readKeyFile, type KeyFile } from "@/lib/key-files/read-key-file";
import type { Conventions } from "@/lib/verify/conventions";
import type { Source } from "@/models";
import { bytesOf } from "./find-source";
import { readRows, type ConventionsChoice, type ReadRow } from "./read-rows";

export type SourceRead = { file: KeyFile; rows: ReadRow[] };

/** Readings of the last few sources: turning the pages of a preview does not read a long file again each time. */
const KEPT = 6;
const kept = new Map<string, Promise<SourceRead>>();

/** Reads the rows of a source by the conventions of its work. What was read is data only; the caller may keep it. */
export async function readSource(
  source: Pick<Source, "id" | "name" | "sha256">,
  conventions: Conventions,
  choice: ConventionsChoice,
): Promise<SourceRead> {
  const key = JSON.stringify([source.id, source.sha256, conventions, choice]);
  const known = kept.get(key);
  if (known) return known;
  const reading = read(source, conventions, choice);
  kept.set(key, reading);
  for (const oldest of [...kept.keys()].slice(0, Math.max(0, kept.size - KEPT))) kept.delete(oldest);
  reading.catch(() => kept.delete(key));
  return reading;
}

async function read(
  source: Pick<Source, "id" | "name">,
  conventions: Conventions,
  choice: ConventionsChoice,
): Promise<SourceRead> {
  const file = readKeyFile(source.name, await bytesOf(source.id));
  return { file, rows: await readRows(file, conventions, choice) };
}
