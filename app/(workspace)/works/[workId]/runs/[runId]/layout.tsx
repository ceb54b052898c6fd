import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { readRun } from "@/lib/runs/read-run";

/** A run that is there for this person. Outside the page's loading state, so that the answer is a 404. */
export default async function RunLayout({ params, children }: LayoutProps<"/works/[workId]/runs/[runId]">) {
  const user = await requireUser();
  await orNotFound(readRun(await params, user));
  return children;
}
