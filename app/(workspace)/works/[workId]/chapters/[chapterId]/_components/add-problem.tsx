"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import { ProblemForm } from "./problem-form";

/** The way to a new problem at the end of the chapter. `lastPage` is where it will stand. */
export function AddProblem({
  workId,
  chapterId,
  lastPage,
  prominent,
}: {
  workId: string;
  chapterId: string;
  lastPage: string;
  prominent: boolean;
}) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  if (!open)
    return (
      <Button
        variant={prominent ? "primary" : "blue"}
        mark={<Mark name="insert" size={16} />}
        onClick={() => setOpen(true)}
      >
        Add a problem
      </Button>
    );
  return (
    <div className="w-full text-left">
      <ProblemForm
        workId={workId}
        target={{ kind: "new", chapterId }}
        onDone={() => {
          setOpen(false);
          router.push(lastPage);
          router.refresh();
        }}
        onCancel={() => setOpen(false)}
      />
    </div>
  );
}
