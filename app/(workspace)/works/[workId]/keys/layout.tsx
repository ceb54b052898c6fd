import { orNotFound } from "@/lib/action";
import { gate } from "@/lib/auth/gate";
import { requireUser } from "@/lib/auth/session";

/** Keys are for those who may read them. Outside the page's loading state, so that the answer is a 404. */
export default async function KeysLayout({ params, children }: LayoutProps<"/works/[workId]/keys">) {
  const user = await requireUser();
  const { workId } = await params;
  await orNotFound(gate(user, "key.read", workId));
  return children;
}
