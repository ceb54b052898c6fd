"use client";

import { useRouter } from "next/navigation";
import { useState, useTransition } from "react";

import { Dialog } from "@/components/ui/dialog";
import { Menu } from "@/components/ui/menu";
import { MenuButton } from "@/components/ui/menu-item";
import { useToast } from "@/components/ui/toast";
import type { Result } from "@/lib/action";
import { changeChapterAction, moveChapterAction, removeChapterAction } from "../actions";
import { ChapterForm } from "./chapter-form";

/** Rename, renumber, move, remove: what is seldom done stands in a menu. */
export function ChapterTools({
  workId,
  chapter,
  place,
  empty,
}: {
  workId: string;
  chapter: { id: string; number: number; title: string };
  place: { first: boolean; last: boolean };
  empty: boolean;
}) {
  const [editing, setEditing] = useState(false);
  const [, start] = useTransition();
  const say = useToast();
  const router = useRouter();
  const which = { workId, chapterId: chapter.id };
  const run = (done: string, action: () => Promise<Result<unknown>>) =>
    start(async () => {
      const result = await action();
      say(result.ok ? done : result.message, { kind: result.ok ? "ok" : "error" });
      router.refresh();
    });
  return (
    <div className="-ml-2">
      <Menu label={<span aria-label={`Change chapter ${chapter.number}`}>Change</span>} align="start">
        <MenuButton onClick={() => setEditing(true)}>Number and title</MenuButton>
        {place.first ? null : (
          <MenuButton
            onClick={() =>
              run("The chapter stands earlier.", () => moveChapterAction({ ...which, direction: "earlier" }))
            }
          >
            Change places with the one before
          </MenuButton>
        )}
        {place.last ? null : (
          <MenuButton
            onClick={() =>
              run("The chapter stands later.", () => moveChapterAction({ ...which, direction: "later" }))
            }
          >
            Change places with the one after
          </MenuButton>
        )}
        {empty ? (
          <MenuButton onClick={() => run("The chapter is removed.", () => removeChapterAction(which))}>
            Remove
          </MenuButton>
        ) : null}
      </Menu>
      <Dialog open={editing} onClose={() => setEditing(false)} title={`Chapter ${chapter.number}`}>
        <ChapterForm
          workId={workId}
          initial={chapter}
          label="Save"
          save={(given) => changeChapterAction({ ...which, number: given.number, title: given.title })}
          onDone={() => {
            setEditing(false);
            say("Saved.");
            router.refresh();
          }}
        />
      </Dialog>
    </div>
  );
}
