"use client";

import { useRouter } from "next/navigation";
import { useState, useTransition } from "react";

import { Mark } from "@/components/marks";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Menu } from "@/components/ui/menu";
import { MenuButton, MenuLink } from "@/components/ui/menu-item";
import { useToast } from "@/components/ui/toast";
import type { Result } from "@/lib/action";
import { moveClaimAction, restoreClaimAction, withdrawClaimAction } from "../actions";

type At = { workId: string; claimId: string; version: number };

/** Withdrawing and restoring, each with its way back. */
export function useWithdrawing({ workId, claimId, version }: At, ref: string) {
  const router = useRouter();
  const say = useToast();
  const [pending, begin] = useTransition();
  const settle = (done: string, result: Result<unknown>, action?: { label: string; run: () => void }) => {
    if (result.ok) say(done, action && { action });
    else say(result.message, { kind: "error" });
    router.refresh();
  };
  const restore = (at: number) =>
    begin(async () =>
      settle(
        `${ref} is back in the key. The next run judges it.`,
        await restoreClaimAction({ workId, claimId, version: at }),
      ),
    );
  const withdraw = () =>
    begin(async () => {
      const result = await withdrawClaimAction({ workId, claimId, version });
      const undo = result.ok ? { label: "Restore", run: () => restore(result.data.version) } : undefined;
      settle(`${ref} is withdrawn and will not be in the key.`, result, undo);
    });
  return { pending, withdraw, restore: () => restore(version) };
}

/** What can be done with one claim of the galley beside changing its text. */
export function ClaimMenu({
  claimRef,
  withdrawn,
  first,
  last,
  ...at
}: At & { claimRef: string; withdrawn: boolean; first: boolean; last: boolean }) {
  const router = useRouter();
  const say = useToast();
  const [asking, setAsking] = useState(false);
  const [, begin] = useTransition();
  const { pending, withdraw, restore } = useWithdrawing(at, claimRef);
  const { workId, claimId } = at;
  const move = (to: "earlier" | "later") =>
    begin(async () => {
      const result = await moveClaimAction({ workId, claimId, to });
      if (!result.ok) say(result.message, { kind: "error" });
      router.refresh();
    });
  return (
    <>
      <Menu
        label={
          <span className="text-quiet">
            <span className="sr-only">{`Claim ${claimRef}: `}</span>more
          </span>
        }
      >
        <MenuLink href={`/works/${workId}/claims/${claimId}`}>History and evidence</MenuLink>
        {first ? null : <MenuButton onClick={() => move("earlier")}>Move earlier</MenuButton>}
        {last ? null : <MenuButton onClick={() => move("later")}>Move later</MenuButton>}
        {withdrawn ? (
          <MenuButton onClick={restore}>
            <Mark name="undo" size={16} /> Restore
          </MenuButton>
        ) : (
          <MenuButton onClick={() => setAsking(true)}>
            <Mark name="withdraw" size={16} /> Withdraw
          </MenuButton>
        )}
      </Menu>
      <WithdrawDialog
        open={asking}
        claimRef={claimRef}
        pending={pending}
        onClose={() => setAsking(false)}
        onWithdraw={() => {
          setAsking(false);
          withdraw();
        }}
      />
    </>
  );
}

/** The question before a claim leaves the key. */
export function WithdrawDialog({
  open,
  claimRef,
  pending,
  onClose,
  onWithdraw,
}: {
  open: boolean;
  claimRef: string;
  pending: boolean;
  onClose: () => void;
  onWithdraw: () => void;
}) {
  return (
    <Dialog
      open={open}
      onClose={onClose}
      title={`Withdraw ${claimRef}?`}
      footer={
        <>
          <Button onClick={onClose}>Keep it</Button>
          <Button variant="primary" pending={pending} onClick={onWithdraw}>
            Withdraw
          </Button>
        </>
      }
    >
      <p>
        It will not be in the key, and an open flag on it is closed. Its text and its history are kept, and it
        can be restored.
      </p>
    </Dialog>
  );
}
