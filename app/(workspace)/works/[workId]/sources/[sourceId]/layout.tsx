import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { findSource } from "@/lib/sources/find-source";

/** A source that is there for this person. Outside the page's loading state, so that the answer is a 404. */
export default async function SourceLayout({
  params,
  children,
}: LayoutProps<"/works/[workId]/sources/[sourceId]">) {
  const user = await requireUser();
  const { workId, sourceId } = await params;
  await orNotFound(findSource(workId, sourceId, user));
  return children;
}
