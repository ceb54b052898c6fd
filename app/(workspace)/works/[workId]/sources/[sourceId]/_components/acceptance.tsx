"use client";

import { useRouter } from "next/navigation";
import { useState, useTransition } from "react";

import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { useToast } from "@/components/ui/toast";
import { acceptSourceAction, setAsideSourceAction, takeUpSourceAction } from "../../actions";

type Counts = {
  rows: number;
  adds: number;
  replaces: number;
  nothing: number;
  refused: number;
  unreadable: number;
  broken: number;
};

/** The author's decision on a source: take the good rows in, take all, or set it aside. */
export function Acceptance({
  workId,
  sourceId,
  state,
  chapterNumber,
  galley,
  seen,
  choice,
  counts,
}: {
  workId: string;
  sourceId: string;
  state: "received" | "accepted" | "set-aside";
  chapterNumber: number;
  galley: string;
  /** what the preview showed; null when there is nothing to accept */
  seen: { fingerprint: string; conventionsVersion: number; seenAt: string } | null;
  choice: "sheet" | "file" | null;
  counts: Counts;
}) {
  const router = useRouter();
  const say = useToast();
  const [doing, setDoing] = useState<"good" | "all" | "aside" | null>(null);
  const [failure, setFailure] = useState<{ message: string; changed: boolean } | null>(null);
  const [pending, begin] = useTransition();
  const away = {
    message:
      "The server could not be reached. Whether it was done is shown when the line is back; asking again does it once only.",
    changed: false,
  };

  const accept = (rows: "good" | "all") => {
    if (!seen) return;
    setDoing(rows);
    setFailure(null);
    begin(async () => {
      const result = await acceptSourceAction({
        workId,
        sourceId,
        rows,
        ...seen,
        ...(choice && { conventions: choice }),
      }).catch(() => null);
      if (!result) setFailure(away);
      else if (result.ok) {
        say(result.data.already ? "This source had been accepted already." : acceptedInWords(result.data));
        router.push(galley);
      } else setFailure({ message: result.message, changed: result.code === "conflict" });
    });
  };

  const change = (to: "aside" | "up") => {
    setDoing("aside");
    setFailure(null);
    begin(async () => {
      const action = to === "aside" ? setAsideSourceAction : takeUpSourceAction;
      const result = await action({ workId, sourceId }).catch(() => null);
      if (!result) setFailure(away);
      else if (result.ok) {
        say(to === "aside" ? "The source is set aside. Its bytes are kept." : "The source is open again.");
        router.refresh();
      } else setFailure({ message: result.message, changed: result.code === "conflict" });
    });
  };

  const entering = counts.adds + counts.replaces;
  const good = entering - counts.unreadable;
  const ready = seen !== null && choice !== null;
  return (
    <div className="grid gap-4">
      {failure ? (
        <Notice
          kind="warn"
          live
          title={failure.message}
          action={
            failure.changed ? (
              <Button
                size="small"
                onClick={() => {
                  setFailure(null);
                  router.refresh();
                }}
              >
                Show the preview as it is now
              </Button>
            ) : undefined
          }
        />
      ) : null}
      {state === "received" ? (
        <div className="flex flex-wrap items-center gap-3 border-y border-ink py-4">
          {good > 0 ? (
            <Button
              variant="primary"
              disabled={!ready}
              pending={pending && doing === "good"}
              pendingLabel="Accepting"
              onClick={() => accept("good")}
            >
              {good === counts.rows && counts.broken === 0
                ? good === 1
                  ? "Accept the row"
                  : `Accept all ${good} rows`
                : good === 1
                  ? "Accept the good row"
                  : `Accept the ${good} good rows`}
            </Button>
          ) : null}
          {counts.unreadable > 0 && counts.refused + counts.broken === 0 ? (
            <Button
              variant="blue"
              disabled={!ready}
              pending={pending && doing === "all"}
              pendingLabel="Accepting"
              onClick={() => accept("all")}
            >
              {`Accept all ${entering}, ${counts.unreadable} unreadable as written`}
            </Button>
          ) : null}
          <Button
            pending={pending && doing === "aside"}
            pendingLabel="Setting aside"
            onClick={() => change("aside")}
          >
            Set aside
          </Button>
          <p className="basis-60 grow font-ui text-xs text-quiet">{advice(counts, good, chapterNumber)}</p>
        </div>
      ) : (
        <div className="flex flex-wrap items-center gap-3">
          <Button pending={pending} pendingLabel="Taking up" onClick={() => change("up")}>
            Take it up again
          </Button>
          <p className="font-ui text-xs text-quiet">
            Its rows are then compared with the chapter as it is now, and can be accepted anew.
          </p>
        </div>
      )}
    </div>
  );
}

function advice(
  { rows, refused, broken, unreadable, nothing }: Counts,
  good: number,
  chapterNumber: number,
): string {
  if (rows === 0) return "There is nothing in this file that could be accepted.";
  if (good === 0 && unreadable === 0)
    return nothing === rows
      ? `Everything in this file is in chapter ${chapterNumber} already.`
      : "No row of this file can enter as it is.";
  const out = refused + broken + unreadable;
  const left = out > 0 ? ` ${out} ${out === 1 ? "line needs" : "lines need"} a look first.` : "";
  return `All of it enters chapter ${chapterNumber} at once, or nothing does.${left} The next run judges the new claims.`;
}

function acceptedInWords({ added, replaced }: { added: number; replaced: number }): string {
  const parts = [added > 0 && `${added} added`, replaced > 0 && `${replaced} replaced`].filter(Boolean);
  return `Accepted: ${parts.join(", ")}. Start a run to have them judged.`;
}
