import { Mark } from "@/components/marks";
import { Math } from "@/components/math";
import { Sheet } from "@/components/ui/page";
import { MarginNote } from "@/components/ui/galley";
import { VERDICTS } from "@/components/words";
import { ScrollBox } from "@/components/ui/scroll-box";
import type { FlagView } from "@/lib/flags/get-flag";

/**
 * The heart of the page: the symbol once, the claimed value in blue and the recomputed one in red under it on the same
 * axis, digits under digits; in the margin the verifier's note on how the one became the other.
 */
export function Comparison({ flag }: { flag: FlagView }) {
  const { exact, claimed, houseForm } = flag;
  const otherForm = houseForm && exact && houseForm.latex !== exact.latex ? houseForm.latex : null;
  const relation = flag.slips[0]?.formulaLatex;
  return (
    <Sheet marks className="grid md:grid-cols-[minmax(0,1fr)_20rem]">
      <figure className="min-w-0 px-5 py-8 sm:px-9 sm:py-10" aria-label="The claim and its recomputation">
        <div className="grid min-w-0 gap-x-5 gap-y-6 lg:grid-cols-[auto_minmax(0,1fr)] lg:items-center">
          <ScrollBox label="the quantity" className="block min-w-0 text-2xl sm:text-3xl lg:row-span-2 py-1">
            {flag.quantity.latex ? (
              <Math own latex={flag.quantity.latex} />
            ) : (
              <code className="font-mono text-lg break-all">{flag.quantity.text}</code>
            )}
          </ScrollBox>
          <ValueLine
            pencil="blue"
            label={`as claimed by ${flag.claimant.name}`}
            typed={claimed.text}
            latex={claimed.latex}
            decimal={claimed.decimal === null ? null : shorten(claimed.decimal)}
          />
          {exact ? (
            <ValueLine
              pencil="red"
              label="as recomputed"
              typed={exact.text}
              latex={exact.latex}
              decimal={shorten(exact.decimal)}
            />
          ) : (
            <p className="font-ui text-sm text-red">
              Nothing could be recomputed: {VERDICTS.unreadable.means.toLowerCase()}
            </p>
          )}
        </div>
        {relation ? (
          <div className="mt-8 border-t border-rule pt-4">
            <p className="font-ui text-xs text-red">
              {flag.slips[0]?.certainty === "likely"
                ? "How the one becomes the other"
                : "How the one may become the other"}
            </p>
            <Math own display wide align="start" latex={relation} className="text-lg" />
          </div>
        ) : null}
        {flag.errors.length > 0 ? <ReadingErrors flag={flag} /> : null}
        {otherForm ? (
          <p className="mt-6 text-quiet">
            The house prints it as <Math own latex={otherForm} className="text-red" />.
          </p>
        ) : null}
      </figure>
      <div className="grid content-start gap-5 border-t border-rule px-5 py-6 md:border-t-0 md:border-l-3 md:border-double md:border-l-red md:py-10 md:pr-6">
        <Diagnosis flag={flag} />
      </div>
    </Sheet>
  );
}

/** One value on the common axis: equals sign, value, first digits, and whose it is. */
function ValueLine({
  pencil,
  label,
  typed,
  latex,
  decimal,
}: {
  pencil: "blue" | "red";
  label: string;
  typed: string;
  latex: string | null;
  decimal: string | null;
}) {
  return (
    <div
      className={`grid min-w-0 grid-cols-[auto_minmax(0,1fr)] items-center gap-x-4 ${pencil === "blue" ? "text-blue" : "text-red"}`}
    >
      <span className="font-work text-2xl sm:text-3xl" aria-hidden="true">
        =
      </span>
      <div className="flex min-w-0 flex-wrap items-center justify-between gap-x-6 gap-y-1">
        <ScrollBox label="the value" className="block min-w-0 py-1 text-2xl sm:text-3xl">
          {latex ? <Math own latex={latex} /> : <code className="font-mono text-lg break-all">{typed}</code>}
        </ScrollBox>
        <div className="text-right font-ui text-xs leading-snug">
          {decimal ? (
            <span className="tabular block text-base whitespace-pre">{aligned(decimal)}</span>
          ) : null}
          <span className="flex items-center justify-end gap-1.5">
            <Mark name={pencil === "blue" ? "person" : "run"} size={13} />
            {label}
          </span>
        </div>
      </div>
    </div>
  );
}

/** Signs stand in a column of their own, so that a lost one is seen at once. */
function aligned(decimal: string): string {
  if (decimal.startsWith("-")) return `− ${decimal.slice(1)}`;
  return /[1-9]/.test(decimal) ? `+ ${decimal}` : decimal;
}

/** Eight digits are enough to see a difference; all twenty stand in the evidence. */
function shorten(full: string): string {
  const decimal = full.includes(".") && !/e/i.test(full) ? full.replace(/\.?0+$/, "") : full;
  return decimal.length > 11 && !/e/i.test(decimal)
    ? decimal.slice(0, decimal.startsWith("-") ? 11 : 10) + "…"
    : decimal;
}

function Diagnosis({ flag }: { flag: FlagView }) {
  const [first, ...others] = flag.slips;
  if (!first)
    return (
      <MarginNote pencil="red" mark={flag.verdict} title={VERDICTS[flag.verdict].word}>
        <p>{flag.reason || VERDICTS[flag.verdict].means}</p>
        {flag.verdict === "discrepant" ? (
          <p className="mt-2">No known slip leads from the one value to the other.</p>
        ) : null}
      </MarginNote>
    );
  return (
    <>
      <MarginNote
        pencil="red"
        mark={flag.verdict}
        title={first.certainty === "likely" ? "Likely so" : "Possibly so"}
      >
        <p>{first.says}</p>
        <p className="mt-2 font-ui text-xs not-italic">slip: {first.names.join(", or ")}</p>
      </MarginNote>
      {others.length > 0 ? (
        <div className="border-t border-rule pt-4">
          <p className="mb-2 font-ui text-xs text-quiet">Or else</p>
          <ul className="grid gap-3 text-sm">
            {others.map((slip) => (
              <li key={slip.says} className="text-red">
                <span className="italic">{slip.says}</span>
                {slip.formulaLatex ? (
                  <ScrollBox label="the relation between both values" className="mt-1 block text-ink py-1">
                    <Math own latex={slip.formulaLatex} />
                  </ScrollBox>
                ) : null}
              </li>
            ))}
          </ul>
        </div>
      ) : null}
    </>
  );
}

/** Where reading stopped: the text as typed, with a caret under the place. */
function ReadingErrors({ flag }: { flag: FlagView }) {
  return (
    <div className="mt-6 grid gap-4">
      {flag.errors.map((error) => {
        const text = error.field === "quantity" ? flag.quantity.text : flag.claimed.text;
        return (
          <div key={`${error.field}${error.at}`}>
            <pre
              tabIndex={0}
              aria-label="as it was typed"
              className="overflow-x-auto font-mono text-sm leading-snug"
            >
              {text}
              {"\n"}
              <span className="text-red" aria-hidden="true">
                {" ".repeat(error.at)}
                {"^".repeat(globalThis.Math.max(1, globalThis.Math.min(error.length, 200)))}
              </span>
            </pre>
            <p className="font-ui text-sm text-red">
              {error.says}
              {error.suggestion ? <span className="text-ink"> Perhaps {error.suggestion}.</span> : null}
            </p>
          </div>
        );
      })}
    </div>
  );
}
