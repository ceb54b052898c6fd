import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { findFlag } from "@/lib/flags/lock-flag";

/** A flag that is there for this person. Outside the page's loading state, so that the answer is a 404. */
export default async function FlagLayout({
  params,
  children,
}: LayoutProps<"/works/[workId]/flags/[flagId]">) {
  const user = await requireUser();
  const { workId, flagId } = await params;
  await orNotFound(findFlag(workId, flagId, user));
  return children;
}
