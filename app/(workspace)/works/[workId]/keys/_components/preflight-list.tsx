import Link from "next/link";

import { Mark, type MarkName } from "@/components/marks";
import { Notice } from "@/components/ui/notice";
import type { Hindrance } from "@/lib/keys/judge-readiness";
import type { Preflight, PreflightGroup } from "@/lib/keys/preflight";
import { WaiverForm } from "./waiver-form";

/** What each hindrance is called, what is to be done about it, and its mark. */
const WORDS: Record<Hindrance, { one: string; many: (n: number) => string; todo: string; mark: MarkName }> = {
  unchecked: {
    one: "1 claim is not checked as it now stands",
    many: (n) => `${n} claims are not checked as they now stand`,
    todo: "Start a run of the chapter.",
    mark: "pending",
  },
  "old-conventions": {
    one: "1 claim was checked under an earlier conventions sheet",
    many: (n) => `${n} claims were checked under an earlier conventions sheet`,
    todo: "Start a run, so that they are judged by the sheet in force.",
    mark: "run",
  },
  "open-flag": {
    one: "1 flag is open",
    many: (n) => `${n} flags are open`,
    todo: "A second author settles each.",
    mark: "discrepant",
  },
  unsettled: {
    one: "1 claim is not right and has no flag",
    many: (n) => `${n} claims are not right and have no flag`,
    todo: "Start a run; it raises the flag that a second author then settles.",
    mark: "contradicted",
  },
  reword: {
    one: "1 claim waits to be reworded",
    many: (n) => `${n} claims wait to be reworded`,
    todo: "The claimant saves a new version, and a run confirms it.",
    mark: "reword",
  },
  undecided: {
    one: "1 claim is undecided",
    many: (n) => `${n} claims are undecided`,
    todo: "Change the claim, or let a lead author name a waiver with its reason.",
    mark: "undecided",
  },
};

/** In order, what still prevents the next key: each line leads to its place and names who can act. */
export function PreflightList({
  workId,
  preflight,
  mayWaive,
}: {
  workId: string;
  preflight: Preflight;
  mayWaive: boolean;
}) {
  const { groups, running, claims, ready, stets, withdrawn, waivers } = preflight;
  if (claims === 0)
    return (
      <p className="text-quiet">
        There is no claim to freeze yet. Add claims to a chapter, then start a run.
      </p>
    );
  return (
    <div className="grid gap-6">
      {running ? (
        <Notice
          kind="info"
          title="A run is under way"
          action={
            <Link className="link" href={`/works/${workId}/runs/${running.runId}`}>
              See how far it has come
            </Link>
          }
        >
          What it finds may change this list. A key can be frozen when it has ended.
        </Notice>
      ) : null}
      {groups.map((group) => (
        <Group key={group.kind} workId={workId} group={group} mayWaive={mayWaive} />
      ))}
      {ready ? (
        <p className="flex items-center gap-3 text-lg text-green">
          <Mark name="confirmed" size={26} />
          Nothing prevents this key.
        </p>
      ) : null}
      {stets + withdrawn + waivers.length > 0 ? (
        <p className="font-ui text-sm text-quiet">
          {[
            stets > 0 ? `${stets} let stand by a stet` : "",
            waivers.length > 0
              ? `${waivers.length} undecided with a waiver (${waivers.map(({ ref, by }) => `${ref}, ${by}`).join("; ")})`
              : "",
            withdrawn > 0 ? `${withdrawn} withdrawn and left out` : "",
          ]
            .filter(Boolean)
            .join(" · ")}
        </p>
      ) : null}
    </div>
  );
}

function Group({ workId, group, mayWaive }: { workId: string; group: PreflightGroup; mayWaive: boolean }) {
  const { one, many, todo, mark } = WORDS[group.kind];
  return (
    <section aria-label={group.total === 1 ? one : many(group.total)}>
      <h3 className="flex items-baseline gap-2.5 text-lg">
        <Mark name={mark} size={20} className="translate-y-0.5 text-red" />
        <span>
          {group.total === 1 ? one : many(group.total)} <span className="text-base text-quiet">{todo}</span>
        </span>
      </h3>
      <ul className="mt-1.5 ml-7.5 grid gap-x-10 sm:grid-cols-2 lg:grid-cols-3">
        {group.lines.map((line) => (
          <li key={line.claimId} className="border-b border-rule py-1.5 text-base">
            <span className="flex flex-wrap items-baseline justify-between gap-x-3">
              <Link className="link inline-flex min-h-6 items-center" href={line.path}>
                {line.ref}
              </Link>
              <span className="font-ui text-xs text-quiet">{line.who}</span>
            </span>
            {group.kind === "undecided" && mayWaive ? (
              <WaiverForm
                workId={workId}
                claimId={line.claimId}
                claimVersion={line.claimVersion}
                claimRef={line.ref}
              />
            ) : null}
          </li>
        ))}
      </ul>
      {group.total > group.lines.length ? (
        <p className="mt-1 ml-7.5 font-ui text-xs text-quiet">and {group.total - group.lines.length} more</p>
      ) : null}
    </section>
  );
}
