import { orNotFound } from "@/lib/action";
import { gate } from "@/lib/auth/gate";
import { requireUser } from "@/lib/auth/session";

/** The review queue is for those who may read flags. Outside the page's loading state, so that the answer is a 404. */
export default async function FlagsLayout({ params, children }: LayoutProps<"/works/[workId]/flags">) {
  const user = await requireUser();
  const { workId } = await params;
  await orNotFound(gate(user, "flag.read", workId));
  return children;
}
