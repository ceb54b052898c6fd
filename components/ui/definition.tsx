import type { ReactNode } from "react";

/** Names and their values, set in two columns with a hairline between rows. */
export function Facts({ items }: { items: readonly { term: ReactNode; value: ReactNode }[] }) {
  return (
    <dl className="grid border-t border-rule font-ui text-sm">
      {items.map((item, i) => (
        <div key={i} className="grid gap-x-4 border-b border-rule py-2 sm:grid-cols-[11rem_minmax(0,1fr)]">
          <dt className="text-quiet">{item.term}</dt>
          <dd className="min-w-0">{item.value}</dd>
        </div>
      ))}
    </dl>
  );
}
