import { cx } from "@/components/cx";
import type { ShownFinding } from "@/components/check-answer";
import { Mark } from "@/components/marks";
import { MathHtml } from "@/components/math-html";
import { TONE_TEXT, VERDICTS } from "@/components/words";
import { ScrollBox } from "@/components/ui/scroll-box";
import type { FindingHtml } from "@/lib/typeset/finding-view";

/**
 * The verifier's note on one claim, as it stands in the margin: the verdict with its mark, the recomputed value, how a
 * wrong one came to be wrong, and why a value vanishes.
 */
export function FindingNote({
  finding,
  html,
  className,
}: {
  finding: ShownFinding;
  html: FindingHtml;
  className?: string;
}) {
  const { word, tone } = VERDICTS[finding.verdict];
  const differs = finding.verdict === "discrepant" || finding.verdict === "contradicted";
  const sentence = html.slips.length === 0 && finding.errors.length === 0 ? finding.reason : null;
  // The sentence of a vanishing claim may have its rules in it already; nothing is said twice.
  const vanishes = finding.zero.filter(({ says }) => !sentence?.includes(says.replace(/\.$/, "")));
  return (
    <div className={cx("grid gap-3", className)}>
      <p className={cx("flex items-center gap-2.5 text-lg leading-tight", TONE_TEXT[tone])}>
        <Mark name={finding.verdict} size={30} />
        <span>{word}</span>
      </p>

      {differs && html.exact && finding.exact ? (
        <div className="text-red">
          <p className="font-ui text-xs">recomputed</p>
          <p className="text-xl">
            <MathHtml html={html.exact} />
          </p>
          <p className="tabular font-ui text-xs text-quiet">
            <Decimal value={finding.exact.decimal} />
          </p>
        </div>
      ) : null}

      {finding.verdict === "confirmed-not-house-form" && html.houseForm ? (
        <div className="text-amber">
          <p className="font-ui text-xs">in house form</p>
          <p className="text-xl">
            <MathHtml html={html.houseForm} />
          </p>
        </div>
      ) : null}

      {html.slips.length > 0 ? (
        <ul className="grid gap-3 text-base leading-snug text-red">
          {html.slips.map((slip, i) => (
            <li key={slip.says}>
              <span className="font-ui text-xs text-quiet">
                {finding.slips[i]?.certainty === "possible" ? "possibly" : "most likely"}
              </span>
              <p className="italic">{slip.says}</p>
              {slip.formula ? (
                <ScrollBox
                  label="the relation between both values"
                  className="block mt-1.5 py-1 text-sm text-ink"
                >
                  <MathHtml html={slip.formula} />
                </ScrollBox>
              ) : null}
            </li>
          ))}
        </ul>
      ) : sentence ? (
        <p className={cx("text-base leading-snug italic", differs ? "text-red" : "text-ink")}>{sentence}</p>
      ) : null}

      {finding.rightUnder ? (
        <div className="text-base leading-snug text-red">
          <p className="font-ui text-xs text-quiet">a matter of convention?</p>
          <p className="italic">{finding.rightUnder.says}</p>
        </div>
      ) : null}

      {vanishes.length > 0 ? (
        <div className="text-base leading-snug">
          <p className="font-ui text-xs text-quiet">
            {vanishes.length < finding.zero.length ? "it vanishes also because" : "why it vanishes"}
          </p>
          <ul className="italic">
            {vanishes.map((reason) => (
              <li key={reason.says}>{reason.says}</li>
            ))}
          </ul>
        </div>
      ) : null}
    </div>
  );
}

/** A decimal with a printed minus sign, shortened for the margin. */
function Decimal({ value }: { value: string }) {
  const short = value.length > 14 ? `${value.slice(0, 13)}…` : value;
  return <span title={value}>{`= ${short.replace(/^-/, "−")}`}</span>;
}
