import { orNotFound } from "@/lib/action";
import { gate } from "@/lib/auth/gate";
import { requireUser } from "@/lib/auth/session";

/** The conventions sheet is for those who read chapters. Outside the page's loading state, so that the answer is a 404. */
export default async function ConventionsLayout({
  params,
  children,
}: LayoutProps<"/works/[workId]/conventions">) {
  const user = await requireUser();
  const { workId } = await params;
  await orNotFound(gate(user, "chapter.read", workId));
  return children;
}
