"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { useToast } from "@/components/ui/toast";
import { addChapterAction } from "../actions";
import { ChapterForm } from "./chapter-form";

export function AddChapter({
  workId,
  number,
  first = false,
}: {
  workId: string;
  number: number;
  first?: boolean;
}) {
  const [open, setOpen] = useState(false);
  const say = useToast();
  const router = useRouter();
  return (
    <>
      <Button
        variant={first ? "primary" : "quiet"}
        mark={<Mark name="insert" />}
        onClick={() => setOpen(true)}
      >
        {first ? "Add the first chapter" : "Add a chapter"}
      </Button>
      <Dialog open={open} onClose={() => setOpen(false)} title="A new chapter">
        <ChapterForm
          workId={workId}
          initial={{ number, title: "" }}
          label="Add the chapter"
          save={addChapterAction}
          onDone={() => {
            setOpen(false);
            say("The chapter is added.");
            router.refresh();
          }}
        />
      </Dialog>
    </>
  );
}
