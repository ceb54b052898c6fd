"use client";

import { useState, useTransition, type FormEvent } from "react";

import { Button } from "@/components/ui/button";
import { FieldMessage, Select } from "@/components/ui/field";
import { useToast } from "@/components/ui/toast";
import { assignFlagAction, takeFlagAction } from "../actions";

type Props = {
  workId: string;
  flagId: string;
  version: number;
  assigneeId: string | null;
  people: { id: string; name: string; role: string }[];
  mayTake: boolean;
  mayAssign: boolean;
};

/** Who settles it: an author may take it, a lead may give it to anybody but the claimant. */
export function AssignPanel({ workId, flagId, version, assigneeId, people, mayTake, mayAssign }: Props) {
  const [pending, start] = useTransition();
  const [error, setError] = useState<string | null>(null);
  const say = useToast();

  const run = (action: () => ReturnType<typeof takeFlagAction>, done: string) =>
    start(async () => {
      const result = await action();
      setError(result.ok ? null : result.message);
      if (result.ok) say(done);
    });
  const assign = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const chosen = String(new FormData(event.currentTarget).get("assigneeId") ?? "");
    const name = people.find(({ id }) => id === chosen)?.name ?? "nobody";
    run(
      () => assignFlagAction({ workId, flagId, version, assigneeId: chosen === "" ? null : chosen }),
      `This flag now waits for ${name}.`,
    );
  };

  return (
    <div className="mt-5 grid gap-4">
      {mayTake ? (
        <Button
          variant="blue"
          pending={pending}
          onClick={() =>
            run(() => takeFlagAction({ workId, flagId, version }), "This flag now waits for you.")
          }
        >
          Take it yourself
        </Button>
      ) : null}
      {mayAssign ? (
        <form
          key={`${assigneeId}`}
          onSubmit={assign}
          className="grid grid-cols-[minmax(0,1fr)_auto] items-end gap-3"
        >
          <Select
            label="Give it to"
            name="assigneeId"
            defaultValue={assigneeId ?? ""}
            options={[
              { value: "", label: "nobody yet" },
              ...people.map(({ id, name, role }) => ({ value: id, label: `${name} (${role})` })),
            ]}
          />
          <Button type="submit" pending={pending}>
            Give
          </Button>
        </form>
      ) : null}
      {error ? <FieldMessage>{error}</FieldMessage> : null}
    </div>
  );
}
