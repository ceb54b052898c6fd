"use server";

import { revalidatePath } from "next/cache";
import { userAction } from "@/lib/action";
import { addChapter } from "@/lib/chapters/add-chapter";
import { changeChapter } from "@/lib/chapters/change-chapter";
import { moveChapter } from "@/lib/chapters/move-chapter";
import { removeChapter } from "@/lib/chapters/remove-chapter";
import { ChapterChange, ChapterMove, ChapterOfWork, NewChapter } from "@/lib/chapters/schema";
import { changeWork } from "@/lib/works/change-work";
import { WorkChange } from "@/lib/works/schema";

const refresh = (workId: string) => revalidatePath(`/works/${workId}`, "layout");

export const changeWorkAction = userAction(WorkChange, async (input, user) => {
  await changeWork(input, user);
  refresh(input.workId);
});

export const addChapterAction = userAction(NewChapter, async (input, user) => {
  const added = await addChapter(input, user);
  refresh(input.workId);
  return added;
});

export const changeChapterAction = userAction(ChapterChange, async (input, user) => {
  await changeChapter(input, user);
  refresh(input.workId);
});

export const moveChapterAction = userAction(ChapterMove, async (input, user) => {
  await moveChapter(input, user);
  refresh(input.workId);
});

export const removeChapterAction = userAction(ChapterOfWork, async (input, user) => {
  await removeChapter(input, user);
  refresh(input.workId);
});
