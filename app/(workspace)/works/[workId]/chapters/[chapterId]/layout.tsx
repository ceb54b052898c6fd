import { orNotFound } from "@/lib/action";
import { requireUser } from "@/lib/auth/session";
import { requireChapter } from "@/lib/chapters/find-chapter";

/** A chapter that is there for this person. Outside the page's loading state, so that the answer is a 404. */
export default async function ChapterLayout({
  params,
  children,
}: LayoutProps<"/works/[workId]/chapters/[chapterId]">) {
  const user = await requireUser();
  const { workId, chapterId } = await params;
  await orNotFound(requireChapter(workId, chapterId, user));
  return children;
}
