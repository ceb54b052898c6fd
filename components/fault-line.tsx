import type { ReadingError } from "@/components/check-answer";

/**
 * A typed line with a caret under the place where reading stopped, what was found there, and what is proposed instead.
 * Pressing a proposal hands it to `onTake`.
 */
export function FaultLine({
  text,
  error,
  onTake,
  id,
}: {
  text: string;
  error: ReadingError;
  onTake?: (text: string) => void;
  id?: string;
}) {
  const proposals = [error.suggestion, error.alternative].filter((proposal) => proposal !== undefined);
  const end = error.at + Math.max(1, error.length);
  return (
    <div id={id} className="border-l-3 border-red bg-red-wash px-4 py-3 font-ui text-sm">
      <p className="overflow-x-auto pb-5 font-mono text-base whitespace-pre text-ink" aria-hidden="true">
        {text.slice(0, error.at)}
        <span className="relative text-red underline decoration-2 underline-offset-4">
          {text.slice(error.at, end) || "\u00a0"}
          <svg
            viewBox="0 0 12 10"
            width="12"
            height="10"
            className="absolute top-full left-0 mt-1"
            fill="none"
            stroke="currentColor"
            strokeWidth="2"
            strokeLinecap="round"
          >
            <path d="m1.5 9 4.5-7.5L10.5 9" />
          </svg>
        </span>
        {text.slice(end)}
      </p>
      <p className="text-red">
        <span className="sr-only">
          {`In the ${error.field === "quantity" ? "quantity" : "claimed value"}, character ${error.at + 1}: `}
        </span>
        {error.says}
      </p>
      {proposals.length > 0 ? (
        <p className="mt-2 flex flex-wrap items-center gap-x-3 gap-y-1.5">
          <span className="text-quiet">
            {proposals.length > 1 ? "Either of these reads:" : "This reads:"}
          </span>
          {proposals.map((proposal) =>
            onTake ? (
              <button
                key={proposal}
                type="button"
                onClick={() => onTake(proposal)}
                className="min-h-8 rounded-sm border border-blue px-2.5 font-mono text-blue hover:bg-blue-wash"
              >
                <span className="sr-only">Take </span>
                {proposal}
              </button>
            ) : (
              <code key={proposal} className="font-mono text-ink">
                {proposal}
              </code>
            ),
          )}
        </p>
      ) : null}
    </div>
  );
}
