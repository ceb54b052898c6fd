import Link from "next/link";

import { MathHtml } from "@/components/math-html";
import { Math } from "@/components/math";
import { VerdictMark } from "@/components/verdict-mark";
import type { FindingShown } from "@/lib/claims/finding-view";
import type { FlagShown } from "@/lib/claims/get-galley";
import { typeset } from "@/lib/typeset/typeset";

/**
 * What the verifier writes into the margin beside one claim: the verdict, and where something is to be done, the
 * recomputed value, one sentence on how the claimed one came about, and the way to the flag.
 */
export function FindingMargin({
  verdict,
  finding,
  flag,
  workId,
}: {
  verdict: FindingShown["verdict"] | null;
  finding: FindingShown | null;
  flag: FlagShown | null;
  workId: string;
}) {
  const differs = verdict === "discrepant" || verdict === "contradicted";
  const [slip] = finding?.slips ?? [];
  const sentence = verdict === "confirmed" ? null : (slip?.says ?? finding?.reason ?? null);
  return (
    <div className="grid gap-1.5 text-sm leading-snug">
      <VerdictMark verdict={verdict} withWord size={20} className="text-sm font-medium" />
      {differs && finding?.exact ? (
        <p className="pencil-red text-lg">
          <span className="sr-only">recomputed value </span>
          <span aria-hidden="true" className="mr-1.5">
            =
          </span>
          <MathHtml html={typeset(finding.exact.latex, { own: true })} />
        </p>
      ) : null}
      {verdict === "confirmed-not-house-form" && finding?.houseForm ? (
        <p className="text-base text-amber">
          <span className="mr-1.5 font-ui text-xs">in house form</span>
          <Math latex={finding.houseForm.latex} own />
        </p>
      ) : null}
      {sentence ? (
        <p className={differs ? "text-red italic" : "text-quiet italic"}>
          {slip && differs ? (
            <span className="mr-1 font-ui text-xs text-quiet not-italic">
              {slip.certainty === "likely" ? "most likely:" : "possibly:"}
            </span>
          ) : null}
          {sentence}
        </p>
      ) : null}
      {flag ? (
        <p className="font-ui">
          <Link href={`/works/${workId}/flags/${flag.id}`} className="link inline-flex min-h-6 items-center">
            {flag.state === "settled"
              ? "Flag, settled"
              : flag.assignee
                ? `Flag, with ${flag.assignee}`
                : "Flag, not assigned yet"}
          </Link>
        </p>
      ) : null}
    </div>
  );
}
