import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { Time } from "@/components/ui/time";
import type { StoredClaim } from "@/lib/claims/find-claim";

type Texts = {
  ref: string;
  quantity: string;
  claimed: string;
  note?: string | null | undefined;
  page?: string | null | undefined;
};

const ROWS = [
  ["ref", "Reference"],
  ["quantity", "Quantity"],
  ["claimed", "Claimed value"],
  ["note", "Note"],
  ["page", "Page"],
] as const;

/** Somebody saved first: what is stored now beside what this person typed, with a way to keep either. */
export function ClaimConflict({
  stored,
  mine,
  onKeepMine,
  onTakeTheirs,
}: {
  stored: StoredClaim;
  mine: Texts;
  onKeepMine: () => void;
  onTakeTheirs: () => void;
}) {
  const differing = ROWS.filter(([name]) => (stored[name] ?? "") !== (mine[name] ?? ""));
  return (
    <Notice
      kind="warn"
      live
      title={`${stored.by} changed this claim while you were writing`}
      action={
        <>
          <Button size="small" variant="blue" onClick={onKeepMine}>
            Save mine as the next version
          </Button>
          <Button size="small" onClick={onTakeTheirs}>
            Take what is stored
          </Button>
        </>
      }
    >
      <p>
        Stored <Time at={stored.at} withClock />. Nothing of yours was saved or lost.
        {stored.withdrawn ? " The claim is withdrawn now." : ""}
      </p>
      {differing.length > 0 ? (
        <table className="mt-2 w-full border-collapse text-left">
          <caption className="sr-only">What is stored now beside what you typed</caption>
          <thead>
            <tr className="text-xs text-quiet">
              <td />
              <th scope="col" className="py-1 pr-3 font-medium">
                stored now
              </th>
              <th scope="col" className="py-1 font-medium">
                yours
              </th>
            </tr>
          </thead>
          <tbody>
            {differing.map(([name, label]) => (
              <tr key={name} className="border-t border-rule align-top">
                <th scope="row" className="py-1 pr-3 font-normal text-quiet">
                  {label}
                </th>
                <td className="py-1 pr-3 font-mono break-all">{stored[name] || "–"}</td>
                <td className="py-1 font-mono break-all text-blue">{mine[name] || "–"}</td>
              </tr>
            ))}
          </tbody>
        </table>
      ) : (
        <p>What you typed is the same as what is stored.</p>
      )}
    </Notice>
  );
}
