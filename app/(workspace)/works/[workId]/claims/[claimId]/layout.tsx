import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { findClaim } from "@/lib/claims/find-claim";

/** A claim that is there for this person. Outside the page's loading state, so that the answer is a 404. */
export default async function ClaimLayout({
  params,
  children,
}: LayoutProps<"/works/[workId]/claims/[claimId]">) {
  const user = await requireUser();
  const { workId, claimId } = await params;
  await orNotFound(findClaim(workId, claimId, user));
  return children;
}
