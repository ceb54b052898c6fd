import Link from "next/link";

import { cx } from "@/components/cx";
import { Mark } from "@/components/marks";
import { Notice } from "@/components/ui/notice";
import type { Difference } from "@/lib/sources/translate";

type Choice = "sheet" | "file";

const CHOICES: readonly { value: Choice; label: string; says: string }[] = [
  {
    value: "sheet",
    label: "Read it by the work's sheet",
    says: "What the file says of its own conventions is passed over; its texts are taken as they stand.",
  },
  {
    value: "file",
    label: "Read it by its own conventions",
    says: "Where the sheet would read something else, a row is rewritten in the sheet's notation. Both are shown below.",
  },
];

/** The file states conventions that are not the work's: which of them hold is the author's choice, never ours. */
export function ConventionsChoice({
  differs,
  choice,
  href,
}: {
  differs: readonly Difference[];
  choice: Choice | null;
  href: (choice: Choice) => string;
}) {
  return (
    <Notice kind="warn" title="This file states conventions that differ from the work's sheet">
      <ul className="mt-1 grid gap-1">
        {differs.map(({ question, file, sheet }) => (
          <li key={question}>
            {question} <b className="font-medium">The file: {file}.</b> The sheet: {sheet}.
          </li>
        ))}
      </ul>
      <ul className="mt-3 grid gap-3 sm:grid-cols-2" aria-label="How to read this file">
        {CHOICES.map(({ value, label, says }) => (
          <li key={value}>
            <Link
              href={href(value)}
              aria-current={choice === value ? "true" : undefined}
              scroll={false}
              className={cx(
                "block h-full border bg-sheet px-4 py-3 no-underline",
                choice === value ? "border-2 border-blue" : "border-edge hover:bg-sunk",
              )}
            >
              <span className="flex items-center gap-2 font-medium">
                {choice === value ? (
                  <Mark name="confirmed" size={16} label="chosen" className="text-blue" />
                ) : null}
                {label}
              </span>
              <span className="mt-0.5 block text-xs text-quiet">{says}</span>
            </Link>
          </li>
        ))}
      </ul>
      {choice === null ? (
        <p className="mt-3 font-medium">
          Choose one of them; until then nothing can be accepted. Below, the rows are read by the sheet.
        </p>
      ) : null}
    </Notice>
  );
}
