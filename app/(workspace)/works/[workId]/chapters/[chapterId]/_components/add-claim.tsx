"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import type { Conventions } from "@/lib/verify/conventions";
import { ClaimForm } from "../../../claims/_components/claim-form";

/** The way to a new claim of one problem. After a save the form stands ready for the next one. */
export function AddClaim({
  workId,
  problem,
  conventions,
}: {
  workId: string;
  problem: { id: string; label: string; proposedRef: string };
  conventions: Conventions;
}) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  if (!open)
    return (
      <Button
        size="small"
        variant="blue"
        className="min-h-9"
        mark={<Mark name="insert" size={14} />}
        onClick={() => setOpen(true)}
      >
        Add a claim<span className="sr-only">{` to problem ${problem.label}`}</span>
      </Button>
    );
  return (
    <ClaimForm
      // The next claim begins with the next reference, once the saved one has come back from the server.
      key={problem.proposedRef}
      workId={workId}
      conventions={conventions}
      target={{ kind: "new", problemId: problem.id }}
      initial={{ ref: problem.proposedRef, quantity: "", claimed: "", note: null, page: null }}
      onDone={() => router.refresh()}
      onCancel={() => setOpen(false)}
    />
  );
}
