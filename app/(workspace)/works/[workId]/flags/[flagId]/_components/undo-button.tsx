"use client";

import { useState, useTransition } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import { FieldMessage } from "@/components/ui/field";
import { useToast } from "@/components/ui/toast";
import { undoSettlementAction } from "../actions";

/** Takes a settlement back; the flag is then open again. */
export function UndoButton({
  workId,
  flagId,
  version,
  claimRef,
}: {
  workId: string;
  flagId: string;
  version: number;
  claimRef: string;
}) {
  const [pending, start] = useTransition();
  const [error, setError] = useState<string | null>(null);
  const say = useToast();
  const undo = () =>
    start(async () => {
      const result = await undoSettlementAction({ workId, flagId, version });
      setError(result.ok ? null : result.message);
      if (result.ok) say(`The flag on ${claimRef} is open again.`);
    });
  return (
    <>
      <Button mark={<Mark name="undo" />} pending={pending} pendingLabel="Undoing" onClick={undo}>
        Undo
      </Button>
      {error ? <FieldMessage>{error}</FieldMessage> : null}
    </>
  );
}
