import Link from "next/link";

import { Table } from "@/components/ui/table";
import { Tag } from "@/components/ui/tag";
import { Time } from "@/components/ui/time";
import { sizeInWords } from "@/lib/sources/limits";
import type { SourceListed } from "@/lib/sources/list-sources";

/** What became of a source, in a word. */
export function SourceStateTag({ state }: { state: SourceListed["state"] }) {
  if (state === "accepted") return <Tag tone="green">accepted</Tag>;
  if (state === "set-aside") return <Tag>set aside</Tag>;
  return <Tag tone="blue">to be looked at</Tag>;
}

/** The key files of a chapter, newest first. */
export function SourceList({ workId, sources }: { workId: string; sources: readonly SourceListed[] }) {
  return (
    <Table
      caption="Sources of this chapter, newest first"
      captionHidden
      rows={sources}
      rowKey={({ id }) => id}
      columns={[
        {
          id: "name",
          header: "File",
          rowHeader: true,
          cell: (source) => (
            <Link
              href={`/works/${workId}/sources/${source.id}`}
              className="link inline-flex min-h-6 items-center break-all"
            >
              {source.name}
            </Link>
          ),
        },
        { id: "state", header: "State", cell: ({ state }) => <SourceStateTag state={state} /> },
        { id: "rows", header: "Rows taken", align: "end", cell: ({ acceptedRows }) => acceptedRows ?? "–" },
        { id: "size", header: "Size", align: "end", cell: ({ size }) => sizeInWords(size) },
        { id: "by", header: "Uploaded by", cell: ({ uploadedBy }) => uploadedBy },
        { id: "at", header: "On", cell: ({ at }) => <Time at={at} withClock /> },
      ]}
    />
  );
}
