import { MathText } from "@/components/math";
import { Time } from "@/components/ui/time";
import type { FlagView } from "@/lib/flags/get-flag";
import { MessageForm } from "./message-form";

/** Notes to each other on this flag, with formulas typeset. */
export function Discussion({ flag }: { flag: FlagView }) {
  return (
    <>
      {flag.messages.length === 0 ? (
        <p className="mb-4 text-quiet">Nobody has written yet.</p>
      ) : (
        <ol className="mb-5">
          {flag.messages.map((message) => (
            <li key={message.id} className="border-b border-rule py-3 first:pt-0">
              <p className="flex flex-wrap items-baseline justify-between gap-x-4 font-ui text-xs text-quiet">
                <b className="text-sm font-medium text-blue">{message.author}</b>
                <Time at={message.at} withClock />
              </p>
              <div className="mt-1 break-words">
                <MathText text={message.body} />
              </div>
            </li>
          ))}
        </ol>
      )}
      {flag.may.discuss ? (
        <MessageForm workId={flag.work.id} flagId={flag.id} />
      ) : (
        <p className="font-ui text-sm text-quiet">
          You can read this discussion; the flag is assigned to somebody else.
        </p>
      )}
    </>
  );
}
