"use client";

import Link from "next/link";
import { useRouter } from "next/navigation";
import { useId, useRef, useState, type DragEvent } from "react";

import { cx } from "@/components/cx";
import { Mark } from "@/components/marks";
import { Button, LinkButton } from "@/components/ui/button";
import { Progress } from "@/components/ui/progress";
import { SOURCE_LIMITS, sizeInWords } from "@/lib/sources/limits";
import { refuseFile, sendFile, type Sent } from "./send-file";

type Item = {
  key: number;
  file: File;
  sent: number;
  outcome: Sent | null;
  abort: AbortController;
};

/** Files in flight at once; the others wait for their turn. */
const AT_ONCE = 2;

/** Key files come in here, by a button or dropped on it, several at once, each with its own progress and its own word. */
export function UploadArea({ workId, chapterId }: { workId: string; chapterId: string }) {
  const router = useRouter();
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  const next = useRef(1);
  const waiting = useRef<Item[]>([]);
  const running = useRef(0);
  const [items, setItems] = useState<Item[]>([]);
  const [over, setOver] = useState(false);

  const put = (key: number, change: Partial<Item>) =>
    setItems((all) => all.map((item) => (item.key === key ? { ...item, ...change } : item)));

  function take(files: readonly File[]) {
    const fresh = files.map((file): Item => {
      const says = refuseFile(file);
      return {
        key: next.current++,
        file,
        sent: 0,
        outcome: says ? { ok: false, message: says } : null,
        abort: new AbortController(),
      };
    });
    setItems((all) => [...fresh, ...all]);
    waiting.current.push(...fresh.filter(({ outcome }) => outcome === null));
    turn();
  }

  function turn() {
    while (running.current < AT_ONCE) {
      const item = waiting.current.shift();
      if (!item) return;
      if (item.abort.signal.aborted) continue;
      running.current += 1;
      void send(item);
    }
  }

  async function send({ key, file, abort }: Item) {
    const outcome = await sendFile(file, { workId, chapterId }, (sent) => put(key, { sent }), abort.signal);
    put(key, { outcome, sent: file.size });
    running.current -= 1;
    if (outcome.ok) router.refresh();
    turn();
  }

  const again = ({ key, file }: Item) => {
    setItems((all) => all.filter((item) => item.key !== key));
    take([file]);
  };
  const stop = ({ key, abort }: Item) => {
    abort.abort();
    put(key, { outcome: { ok: false, message: "Stopped. Nothing was kept." } });
  };

  const drag = (entering: boolean) => (event: DragEvent) => {
    event.preventDefault();
    setOver(entering);
  };
  return (
    <div>
      <div
        onDragEnter={drag(true)}
        onDragOver={drag(true)}
        onDragLeave={drag(false)}
        onDrop={(event) => {
          drag(false)(event);
          take([...event.dataTransfer.files]);
        }}
        className={cx(
          "flex flex-wrap items-center gap-x-6 gap-y-4 border border-dashed px-6 py-6 transition-colors",
          over ? "border-blue bg-blue-wash" : "border-edge bg-sheet",
        )}
      >
        <Mark name="source" size={40} className="text-blue" />
        <div className="min-w-0 flex-1 basis-60">
          <p>Put key files here, or choose them.</p>
          <p id={`${id}-hint`} className="mt-0.5 font-ui text-xs text-quiet">
            CSV with the columns ref, quantity, claimed, or JSON; UTF-8, at most{" "}
            {sizeInWords(SOURCE_LIMITS.bytes)} each. Nothing enters the chapter before you have looked at it.
          </p>
        </div>
        <Button variant="blue" onClick={() => input.current?.click()} aria-describedby={`${id}-hint`}>
          Choose files
        </Button>
        <input
          ref={input}
          type="file"
          multiple
          accept=".csv,.json,text/csv,application/json"
          tabIndex={-1}
          className="sr-only"
          aria-label="Key files to upload"
          onChange={(event) => {
            take([...(event.target.files ?? [])]);
            event.target.value = "";
          }}
        />
      </div>
      {items.length > 0 ? (
        <ul aria-label="Uploads" className="mt-4 grid gap-3">
          {items.map((item) => (
            <li key={item.key} className="border-b border-rule pb-3">
              <UploadLine workId={workId} item={item} onAgain={() => again(item)} onStop={() => stop(item)} />
            </li>
          ))}
        </ul>
      ) : null}
      <p role="status" className="sr-only">
        {items.length > 0 && items.every(({ outcome }) => outcome !== null)
          ? `${items.filter(({ outcome }) => outcome?.ok).length} of ${items.length} files were received.`
          : ""}
      </p>
    </div>
  );
}

function UploadLine({
  workId,
  item,
  onAgain,
  onStop,
}: {
  workId: string;
  item: Item;
  onAgain: () => void;
  onStop: () => void;
}) {
  const { file, outcome, sent } = item;
  if (outcome === null)
    return (
      <div className="flex flex-wrap items-end gap-4">
        <div className="min-w-0 flex-1 basis-60">
          <Progress
            label={file.name}
            done={sent}
            total={file.size}
            text={sent === 0 ? "waiting" : `${sizeInWords(sent)} of ${sizeInWords(file.size)}`}
          />
        </div>
        <Button size="small" className="min-h-9" onClick={onStop}>
          Stop<span className="sr-only">{` ${file.name}`}</span>
        </Button>
      </div>
    );
  if (!outcome.ok)
    return (
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2 font-ui text-sm">
        <Mark name="discrepant" className="text-red" label="Not received" />
        <p className="min-w-0 flex-1 basis-60">
          <b className="font-medium break-all">{file.name}</b>{" "}
          <span className="text-red">{outcome.message}</span>
        </p>
        {refuseFile(file) === null ? (
          <Button size="small" className="min-h-9" onClick={onAgain}>
            Try again<span className="sr-only">{` with ${file.name}`}</span>
          </Button>
        ) : null}
      </div>
    );
  const { source } = outcome;
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-2 font-ui text-sm">
      <Mark name={source.same ? "info" : "confirmed"} className={source.same ? "text-blue" : "text-green"} />
      <p className="min-w-0 flex-1 basis-60">
        <b className="font-medium break-all">{file.name}</b>{" "}
        {source.same ? (
          <>
            holds the very bytes of{" "}
            <Link href={`/works/${workId}/sources/${source.id}`} className="link break-all">
              {source.name}
            </Link>
            , which this chapter has already
            {source.state === "accepted"
              ? " and which was accepted"
              : source.state === "set-aside"
                ? " and which was set aside"
                : ""}
            . It was not stored twice.
          </>
        ) : (
          <>received whole, {sizeInWords(file.size)}.</>
        )}
      </p>
      <LinkButton
        size="small"
        variant={source.same ? "quiet" : "blue"}
        className="min-h-9"
        href={`/works/${workId}/sources/${source.id}`}
      >
        {source.same ? "Open that source" : "Look at its rows"}
      </LinkButton>
    </div>
  );
}
