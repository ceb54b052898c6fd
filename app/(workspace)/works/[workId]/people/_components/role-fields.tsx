"use client";

import { useController, useFormContext, useWatch } from "react-hook-form";

import { Checkbox, FieldMessage, RadioCards } from "@/components/ui/field";
import { ROLES, type Role } from "@/lib/auth/permissions";
import { ROLE_WORDS } from "@/lib/people/schema";

export type SeatFields = { role: Role; chapterIds: string[] | null };

/** A role and, for a referee, the chapters it reaches. */
export function RoleFields({
  chapters,
  disabled = [],
}: {
  chapters: readonly { id: string; label: string }[];
  disabled?: readonly Role[];
}) {
  const { register, formState, setValue } = useFormContext<SeatFields>();
  const role = useWatch<SeatFields, "role">({ name: "role" });
  return (
    <div className="grid gap-5">
      <RadioCards
        legend="Role"
        columns={2}
        error={formState.errors.role}
        options={ROLES.map((value) => ({
          value,
          label: ROLE_WORDS[value].name,
          hint: ROLE_WORDS[value].does,
          disabled: disabled.includes(value),
        }))}
        {...register("role", {
          onChange: (event: { target: { value: string } }) => {
            if (event.target.value !== "referee") setValue("chapterIds", null);
          },
        })}
      />
      {role === "referee" ? <ChapterChoice chapters={chapters} /> : null}
    </div>
  );
}

function ChapterChoice({ chapters }: { chapters: readonly { id: string; label: string }[] }) {
  const { field, fieldState } = useController<SeatFields, "chapterIds">({ name: "chapterIds" });
  const chosen = field.value;
  const toggle = (id: string, on: boolean) =>
    field.onChange(on ? [...(chosen ?? []), id] : (chosen ?? []).filter((one) => one !== id));
  return (
    <fieldset className="font-ui">
      <legend className="text-sm font-medium">Chapters they read</legend>
      <div className="mt-2 grid gap-2.5">
        <Checkbox
          label="all chapters, also those still to come"
          checked={chosen === null}
          onChange={(event) => field.onChange(event.target.checked ? null : [])}
        />
        {chosen === null
          ? null
          : chapters.map(({ id, label }) => (
              <Checkbox
                key={id}
                label={<bdi>{label}</bdi>}
                checked={chosen.includes(id)}
                onChange={(event) => toggle(id, event.target.checked)}
              />
            ))}
        {chosen !== null && chapters.length === 0 ? (
          <p className="text-sm text-quiet">This work has no chapters yet.</p>
        ) : null}
      </div>
      {fieldState.error?.message ? <FieldMessage>{fieldState.error.message}</FieldMessage> : null}
    </fieldset>
  );
}
