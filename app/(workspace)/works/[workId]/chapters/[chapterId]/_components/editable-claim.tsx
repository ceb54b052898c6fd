"use client";

import { useRouter } from "next/navigation";
import { useState, type ReactNode } from "react";

import { Button } from "@/components/ui/button";
import type { Conventions } from "@/lib/verify/conventions";
import { ClaimForm } from "../../../claims/_components/claim-form";
import { ClaimMenu } from "../../../claims/_components/claim-menu";

export type EditableClaimData = {
  id: string;
  ref: string;
  version: number;
  quantity: string;
  claimed: string;
  note: string | null;
  page: string | null;
  withdrawn: boolean;
  first: boolean;
  last: boolean;
};

/** A line of the galley with its notes, which turns into its form in place. */
export function EditableClaim({
  workId,
  conventions,
  claim,
  line,
  notes,
}: {
  workId: string;
  conventions: Conventions;
  claim: EditableClaimData;
  line: ReactNode;
  notes: ReactNode;
}) {
  const router = useRouter();
  const [editing, setEditing] = useState(false);
  const { id, ref, version, quantity, claimed, note, page } = claim;
  if (editing)
    return (
      <ClaimForm
        workId={workId}
        conventions={conventions}
        target={{ kind: "edit", claimId: id, version }}
        initial={{ ref, quantity, claimed, note, page }}
        onDone={() => {
          setEditing(false);
          router.refresh();
        }}
        onCancel={() => setEditing(false)}
      />
    );
  return (
    <div id={`claim-${id}`} className="galley-line target:bg-amber-wash">
      <div className="galley-text flex min-w-0 flex-wrap items-start justify-between gap-x-4">
        <div className="min-w-0 flex-1 basis-64">{line}</div>
        <div className="no-print -my-1.5 flex shrink-0 items-center gap-3">
          <Button size="small" variant="blue" className="min-h-9" onClick={() => setEditing(true)}>
            Edit<span className="sr-only">{` claim ${ref}`}</span>
          </Button>
          <ClaimMenu
            workId={workId}
            claimId={id}
            claimRef={ref}
            version={version}
            withdrawn={claim.withdrawn}
            first={claim.first}
            last={claim.last}
          />
        </div>
      </div>
      <div className="galley-notes min-w-0">{notes}</div>
    </div>
  );
}
