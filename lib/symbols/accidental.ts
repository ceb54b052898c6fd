/** Up to so many terms of a sum are written out in a sentence. */
const TERMS_IN_A_SENTENCE = 8;

/** The reason of an accidental zero, with the terms that cancel; `sum` names the sum ("Racah's sum"). */
export function accidentalReason(
  sum: string,
  terms: readonly bigint[],
): { rule: "accidental"; says: string } {
  const shown = terms.slice(0, TERMS_IN_A_SENTENCE).map((t, n) => {
    const size = (t < 0n ? -t : t).toString();
    return n === 0 ? (t < 0n ? `−${size}` : size) : `${t < 0n ? "−" : "+"} ${size}`;
  });
  const rest = terms.length > TERMS_IN_A_SENTENCE ? ` + … (${terms.length} terms)` : "";
  return {
    rule: "accidental",
    says: `No rule and no symmetry forbids it; the terms of ${sum} happen to cancel: ${shown.join(" ")}${rest} = 0.`,
  };
}
