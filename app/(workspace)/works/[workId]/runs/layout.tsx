import { orNotFound } from "@/lib/action";
import { gate } from "@/lib/auth/gate";
import { requireUser } from "@/lib/auth/session";

/** Runs are for those who read chapters. Outside the page's loading state, so that the answer is a 404. */
export default async function RunsLayout({ params, children }: LayoutProps<"/works/[workId]/runs">) {
  const user = await requireUser();
  const { workId } = await params;
  await orNotFound(gate(user, "chapter.read", workId));
  return children;
}
