"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState, useTransition } from "react";
import { FormProvider, useForm } from "react-hook-form";

import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import type { Role } from "@/lib/auth/permissions";
import { RoleChange } from "@/lib/people/schema";
import { showFailure } from "../../../_components/show-failure";
import { changeRoleAction, removeMemberAction } from "../actions";
import { RoleFields } from "./role-fields";

type Member = { userId: string; name: string; role: Role; chapterIds: string[] | null; isSelf: boolean };
type Chapters = readonly { id: string; label: string }[];

/** What can be done about one person: another role, or taking them off the work; oneself can leave. */
export function MemberTools({
  workId,
  member,
  mayManage,
  isLastLead,
  chapters,
}: {
  workId: string;
  member: Member;
  mayManage: boolean;
  isLastLead: boolean;
  chapters: Chapters;
}) {
  const [open, setOpen] = useState<"role" | "remove" | null>(null);
  const close = () => setOpen(null);
  if (isLastLead)
    return <span className="text-xs text-quiet">the only lead: make somebody else lead before leaving</span>;
  return (
    <span className="flex flex-wrap gap-2">
      {mayManage ? (
        <Button size="small" aria-label={`Change the role of ${member.name}`} onClick={() => setOpen("role")}>
          Role
        </Button>
      ) : null}
      <Button
        size="small"
        aria-label={member.isSelf ? "Leave this work" : `Take ${member.name} off this work`}
        onClick={() => setOpen("remove")}
      >
        {member.isSelf ? "Leave" : "Take off"}
      </Button>
      <Dialog open={open === "role"} onClose={close} title={<>The role of {member.name}</>} wide>
        <RoleForm workId={workId} member={member} chapters={chapters} onDone={close} />
      </Dialog>
      <Dialog
        open={open === "remove"}
        onClose={close}
        title={member.isSelf ? "Leave this work?" : <>Take {member.name} off this work?</>}
        footer={<RemoveFooter workId={workId} member={member} onDone={close} />}
      >
        <p>
          {member.isSelf
            ? "You will see nothing of it any more, until somebody invites you again."
            : "They will see nothing of it from their next click on."}{" "}
          What was written and settled stays, with its author’s name. Open flags that were assigned wait for
          somebody else.
        </p>
      </Dialog>
    </span>
  );
}

function RemoveFooter({ workId, member, onDone }: { workId: string; member: Member; onDone: () => void }) {
  const [pending, start] = useTransition();
  const say = useToast();
  const router = useRouter();
  const remove = () =>
    start(async () => {
      const result = await removeMemberAction({ workId, userId: member.userId });
      onDone();
      say(
        result.ok
          ? member.isSelf
            ? "You have left the work."
            : `${member.name} is off the work.`
          : result.message,
        {
          kind: result.ok ? "ok" : "error",
        },
      );
      if (result.ok && member.isSelf) router.push("/desk");
      else router.refresh();
    });
  return (
    <>
      <Button onClick={onDone}>{member.isSelf ? "Stay" : "Keep them"}</Button>
      <Button variant="danger" pending={pending} pendingLabel="One moment" onClick={remove}>
        {member.isSelf ? "Leave" : "Take off"}
      </Button>
    </>
  );
}

function RoleForm({
  workId,
  member,
  chapters,
  onDone,
}: {
  workId: string;
  member: Member;
  chapters: Chapters;
  onDone: () => void;
}) {
  const form = useForm({
    resolver: zodResolver(RoleChange),
    defaultValues: { workId, userId: member.userId, role: member.role, chapterIds: member.chapterIds },
  });
  const say = useToast();
  const router = useRouter();
  const { errors, isSubmitting } = form.formState;
  const submit = form.handleSubmit(async (given) => {
    const result = await changeRoleAction(given);
    if (!result.ok) return showFailure(form, result);
    onDone();
    say("The role is changed; it holds from their next click on.");
    router.refresh();
  });
  return (
    <FormProvider {...form}>
      <form onSubmit={submit} noValidate className="grid gap-6">
        {errors.root ? <Notice kind="error" title={errors.root.message} live /> : null}
        <RoleFields chapters={chapters} />
        <div>
          <Button type="submit" variant="primary" pending={isSubmitting} pendingLabel="Saving">
            Save
          </Button>
        </div>
      </form>
    </FormProvider>
  );
}
