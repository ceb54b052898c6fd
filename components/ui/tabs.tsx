"use client";

import { Tabs as Primitive } from "radix-ui";
import type { ReactNode } from "react";

export type Tab = { id: string; label: ReactNode; content: ReactNode };

/** A few views of the same thing, one shown at a time. Arrow keys walk along the labels. */
export function Tabs({ label, tabs, initial }: { label: string; tabs: readonly Tab[]; initial?: string }) {
  return (
    <Primitive.Root defaultValue={initial ?? tabs[0]?.id}>
      <Primitive.List
        aria-label={label}
        className="flex flex-wrap gap-x-6 border-b border-ink font-ui text-sm"
      >
        {tabs.map((tab) => (
          <Primitive.Trigger
            key={tab.id}
            value={tab.id}
            className="-mb-px min-h-11 border-b-3 border-transparent text-quiet hover:text-ink data-[state=active]:border-ink data-[state=active]:text-ink"
          >
            {tab.label}
          </Primitive.Trigger>
        ))}
      </Primitive.List>
      {tabs.map((tab) => (
        <Primitive.Content key={tab.id} value={tab.id} className="pt-5">
          {tab.content}
        </Primitive.Content>
      ))}
    </Primitive.Root>
  );
}
