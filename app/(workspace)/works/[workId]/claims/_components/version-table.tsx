import Link from "next/link";

import { Table } from "@/components/ui/table";
import { Time } from "@/components/ui/time";
import type { VersionShown } from "@/lib/claims/get-claim";
import type { ClaimOrigin } from "@/models/claim-version";
import { TypesetClaim } from "./typeset-claim";

const HOW: Record<ClaimOrigin, string> = {
  typed: "written in the form",
  source: "accepted from a source",
  corrected: "corrected in settling a flag",
  undone: "brought back when a settling was undone",
  restored: "restored after it had been withdrawn",
};

/** Every version of a claim, newest first: who, when, how, and what it said. */
export function VersionTable({
  workId,
  versions,
  maySources,
}: {
  workId: string;
  versions: readonly VersionShown[];
  maySources: boolean;
}) {
  return (
    <Table
      caption="Versions of this claim, newest first"
      captionHidden
      rows={versions}
      rowKey={({ number }) => String(number)}
      columns={[
        {
          id: "number",
          header: "Version",
          rowHeader: true,
          cell: ({ number }) => <span className="tabular">{number}</span>,
        },
        {
          id: "text",
          header: "Claim",
          cell: (version) => (
            <div className="font-work text-base">
              <TypesetClaim {...version} />
              {version.note || version.page ? (
                <p className="text-sm text-blue italic">
                  {[version.note, version.page && `page ${version.page}`].filter(Boolean).join(" · ")}
                </p>
              ) : null}
            </div>
          ),
        },
        { id: "author", header: "By", cell: ({ author }) => author },
        {
          id: "how",
          header: "How",
          cell: ({ origin, source }) =>
            source && maySources ? (
              <>
                {HOW[origin]},{" "}
                <Link className="link break-all" href={`/works/${workId}/sources/${source.id}`}>
                  {source.name}
                </Link>
              </>
            ) : (
              HOW[origin]
            ),
        },
        { id: "at", header: "On", cell: ({ at }) => <Time at={at} withClock /> },
      ]}
    />
  );
}
