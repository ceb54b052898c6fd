import "server-only";
import { readFile } from "node:fs/promises";
import path from "node:path";
import { z } from "zod";
import { env } from "@/lib/env";

const DemoPeople = z.array(
  z.object({ name: z.string(), email: z.string(), password: z.string(), role: z.string() }),
);
export type DemoPerson = z.output<typeof DemoPeople>[number];

/** The people of the demo work with their passwords, while the demo is on; else nobody. */
export async function demoPeople(): Promise<DemoPerson[]> {
  if (!env.SURDMARK_DEMO) return [];
  try {
    const file = path.join(/* turbopackIgnore: true */ env.LOCAL_FOLDER, "demo.json");
    return DemoPeople.parse(JSON.parse(await readFile(file, "utf8")));
  } catch {
    return [];
  }
}
