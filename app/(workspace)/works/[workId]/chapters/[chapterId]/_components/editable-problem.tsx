"use client";

import { useRouter } from "next/navigation";
import { useState, useTransition, type ReactNode } from "react";

import { Menu } from "@/components/ui/menu";
import { MenuButton } from "@/components/ui/menu-item";
import { useToast } from "@/components/ui/toast";
import { moveProblemAction, removeProblemAction } from "../../actions";
import { ProblemForm } from "./problem-form";

/** A problem's head as it is printed, which turns into its form; `children` is what stands there otherwise. */
export function EditableProblem({
  workId,
  problem,
  children,
}: {
  workId: string;
  problem: {
    id: string;
    label: string;
    statement: string;
    version: number;
    first: boolean;
    last: boolean;
    empty: boolean;
  };
  children: ReactNode;
}) {
  const router = useRouter();
  const say = useToast();
  const [editing, setEditing] = useState(false);
  const [, begin] = useTransition();
  const { id: problemId, label, statement, version } = problem;
  const move = (to: "earlier" | "later") =>
    begin(async () => {
      const result = await moveProblemAction({ workId, problemId, to });
      if (!result.ok) say(result.message, { kind: "error" });
      router.refresh();
    });
  const remove = () =>
    begin(async () => {
      const result = await removeProblemAction({ workId, problemId });
      if (result.ok) say(`Problem ${label} is removed.`);
      else say(result.message, { kind: "error" });
      router.refresh();
    });
  if (editing)
    return (
      <ProblemForm
        workId={workId}
        target={{ kind: "edit", problemId, version, label, statement }}
        onDone={() => {
          setEditing(false);
          router.refresh();
        }}
        onCancel={() => setEditing(false)}
      />
    );
  return (
    <div className="flex items-start gap-4">
      <div className="min-w-0 flex-1">{children}</div>
      <div className="no-print -mt-1.5 flex shrink-0 items-center gap-3">
        <Menu
          label={
            <span className="text-quiet">
              <span className="sr-only">{`Problem ${label}: `}</span>more
            </span>
          }
        >
          <MenuButton onClick={() => setEditing(true)}>Edit label and statement</MenuButton>
          {problem.first ? null : <MenuButton onClick={() => move("earlier")}>Move earlier</MenuButton>}
          {problem.last ? null : <MenuButton onClick={() => move("later")}>Move later</MenuButton>}
          {problem.empty ? <MenuButton onClick={remove}>Remove this empty problem</MenuButton> : null}
        </Menu>
      </div>
    </div>
  );
}
