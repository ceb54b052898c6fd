import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { findKey } from "@/lib/keys/find-key";

/** A key that was frozen, for those who may read it. Outside the page's loading state, so that the answer is a 404. */
export default async function KeyLayout({ params, children }: LayoutProps<"/works/[workId]/keys/[number]">) {
  const user = await requireUser();
  const { workId, number } = await params;
  await orNotFound(findKey(workId, number, user));
  return children;
}
