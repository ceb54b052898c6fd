import type { FlagView } from "@/lib/flags/get-flag";
import { typeset } from "@/lib/typeset/typeset";

/** What the settling form needs of a flag: plain data, the value that "correct" would put in already typeset. */
export function settleForm(flag: FlagView, next: string) {
  const printed = flag.houseForm?.latex ?? flag.exact?.latex ?? null;
  return {
    workId: flag.work.id,
    flagId: flag.id,
    version: flag.version,
    claimRef: flag.claim.ref, // not `ref`: React keeps that name for itself
    claimant: flag.claimant.name,
    correctionHtml: printed === null ? null : typeset(printed, { own: true }),
    maySettle: flag.may.settle,
    whyNot: flag.whyNot,
    next,
  };
}
export type SettleView = ReturnType<typeof settleForm>;
