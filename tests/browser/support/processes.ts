import { readdirSync, readFileSync } from "node:fs";

/** The process that serves the pages of the product under test: told from others by the port it was started with. */
export function webProcess(): number {
  const port = new URL(process.env.BASE_URL ?? "http://localhost:3000").port;
  for (const entry of readdirSync("/proc")) {
    if (!/^\d+$/.test(entry)) continue;
    try {
      const variables = readFileSync(`/proc/${entry}/environ`, "utf8").split("\0");
      const words = readFileSync(`/proc/${entry}/cmdline`, "utf8").split("\0");
      const serves =
        words[0]?.startsWith("next-server") || words.some((word) => /next\/dist\/bin\/next$/.test(word));
      if (serves && variables.includes("SURDMARK_PROCESS=web") && variables.includes(`PORT=${port}`))
        return Number(entry);
    } catch {
      // Gone between the listing and the look, or somebody else's.
    }
  }
  throw new Error(`no web process for port ${port}`);
}
