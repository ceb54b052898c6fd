import { Session } from "@/models";
import type { SessionUser } from "@/lib/auth/user";
import type { Verdict } from "@/models/finding";
import { foundSince, MOST_FOUND, type Found } from "./found";
import { cellsSince, LARGEST_STRIP } from "./get-run";
import { readRun } from "./read-run";
import { runProgress, type RunProgress } from "./run-progress";
import type { ThisRun } from "./schema";

/** What is new since the last look. `id` is where to go on after a broken connection. */
export type RunNews = { id: string; progress: RunProgress; cells: [string, Verdict][]; found: Found[] };

/**
 * Findings carry the moment they were judged, a little before they can be seen; a look goes back this far, so that none
 * falls between two looks. Whoever listens knows findings by their id and does not mind one twice.
 */
const LOOK_BACK_MS = 20_000;

/** Looks at one run again and again. Each look asks anew whether this person may still read it. */
export function watchRun(which: ThisRun, user: SessionUser, from: Date | null) {
  const told = new Set<string>();
  let since = from;
  let last = "";
  let listed = 0;
  return {
    /**
     * @returns what is new, or null when nothing is
     * @throws AppError not_found when the run is, or is no longer, for this person
     */
    look: async (): Promise<RunNews | null> => {
      const now = new Date();
      const { run } = await readRun(which, user);
      const back = new Date((since?.getTime() ?? 0) - LOOK_BACK_MS);
      const [progress, cells, found] = await Promise.all([
        runProgress(run),
        run.total <= LARGEST_STRIP ? cellsSince(run.id, back) : [],
        listed < MOST_FOUND ? foundSince(run.id, since && back, told) : [],
      ]);
      const fresh = cells.filter(([id, verdict]) => !told.has(`${id} ${verdict}`));
      for (const [id, verdict] of fresh) told.add(`${id} ${verdict}`);
      for (const { id } of found) told.add(id);
      listed += found.length;
      since = now;
      const changed = `${progress.state} ${progress.done}`;
      if (changed === last && fresh.length === 0 && found.length === 0) return null;
      last = changed;
      return { id: now.toISOString(), progress, cells: fresh, found };
    },
  };
}

/** Whether the sign-in behind an open stream is still in force. */
export async function isSignedIn({ sessionId }: SessionUser): Promise<boolean> {
  const session = await Session.findByPk(sessionId, { attributes: ["revokedAt", "expiresAt"] });
  return session !== null && session.revokedAt === null && session.expiresAt > new Date();
}
