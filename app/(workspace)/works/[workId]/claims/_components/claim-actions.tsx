"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import type { Conventions } from "@/lib/verify/conventions";
import { ClaimForm } from "./claim-form";
import { useWithdrawing, WithdrawDialog } from "./claim-menu";

type Props = {
  workId: string;
  conventions: Conventions;
  claim: {
    id: string;
    ref: string;
    version: number;
    quantity: string;
    claimed: string;
    note: string | null;
    page: string | null;
    withdrawn: boolean;
  };
};

/** Editing, withdrawing and restoring one claim on its own page. */
export function ClaimActions({ workId, conventions, claim }: Props) {
  const router = useRouter();
  const [editing, setEditing] = useState(false);
  const [asking, setAsking] = useState(false);
  const { id, ref, version, quantity, claimed, note, page, withdrawn } = claim;
  const { pending, withdraw, restore } = useWithdrawing({ workId, claimId: id, version }, ref);
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
    <div className="no-print flex flex-wrap gap-3">
      <Button variant="blue" onClick={() => setEditing(true)}>
        Edit this claim
      </Button>
      {withdrawn ? (
        <Button pending={pending} mark={<Mark name="undo" size={16} />} onClick={restore}>
          Restore
        </Button>
      ) : (
        <Button pending={pending} mark={<Mark name="withdraw" size={16} />} onClick={() => setAsking(true)}>
          Withdraw
        </Button>
      )}
      <WithdrawDialog
        open={asking}
        claimRef={ref}
        pending={pending}
        onClose={() => setAsking(false)}
        onWithdraw={() => {
          setAsking(false);
          withdraw();
        }}
      />
    </div>
  );
}
