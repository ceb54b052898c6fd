"use client";

import { useId, useState } from "react";

import type { CheckAnswer } from "@/components/check-answer";
import { cx } from "@/components/cx";
import { EvidenceSheet } from "@/components/evidence";
import { FaultLine } from "@/components/fault-line";
import { FindingNote } from "@/components/finding-note";
import { MathHtml } from "@/components/math-html";
import { SymbolGrid } from "@/components/symbol-grid";
import { cellsOf, kindOf, type SymbolKind } from "@/components/symbol-notation";
import { Button } from "@/components/ui/button";
import { Disclosure } from "@/components/ui/disclosure";
import { FieldMessage } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { useCheck, type Claim } from "@/components/use-check";
import { VERDICTS } from "@/components/words";
import { ScrollBox } from "@/components/ui/scroll-box";
import type { Conventions } from "@/lib/verify/conventions";

type Way = SymbolKind | "line";

const WAYS: readonly { value: Way; label: string; says: string }[] = [
  { value: "3j", label: "3j symbol", says: "3j" },
  { value: "cg", label: "Clebsch-Gordan", says: "CG" },
  { value: "line", label: "typed line", says: "line" },
];

const EMPTY: Claim = { quantity: "", claimed: "" };

/**
 * One claim, typed as it is printed, with the verifier's note appearing beside it. Keeps its own state: `onChange` tells
 * what is typed, `onReading` what the verifier says of it. Ids of the two fields: `${id}-quantity` and `${id}-claimed`.
 */
export function ClaimCheck({
  conventions,
  initial = EMPTY,
  initialAnswer = null,
  onChange,
  onReading,
  errors,
  id,
}: {
  conventions?: Partial<Conventions>;
  initial?: Claim;
  /** The answer to `initial`, when the server has it already. */
  initialAnswer?: CheckAnswer | null;
  onChange?: (claim: Claim) => void;
  onReading?: (answer: CheckAnswer) => void;
  /** Errors of the form around it. */
  errors?: { quantity?: string; claimed?: string };
  id?: string;
}) {
  const own = useId();
  const base = id ?? own;
  const cgOrder = conventions?.cgOrder ?? "j1m1j2m2";
  const [claim, setClaim] = useState(initial);
  const [way, setWay] = useState<Way>(() => wayOf(initial.quantity));
  const valued = claim.claimed.trim() !== "";
  const { answer, stale, failure, retry } = useCheck(
    claim,
    // A symbol with empty cells is not asked about: it is being typed. A line is shown as read before it has a value.
    way === "line" ? claim.quantity.trim() !== "" : valued && cellsOf(way, claim.quantity) !== null,
    conventions,
    initialAnswer,
    (read) => {
      if (read.finding.claimed.trim() !== "") onReading?.(read);
    },
  );

  function put(change: Partial<Claim>) {
    const next = { ...claim, ...change };
    setClaim(next);
    onChange?.(next);
  }

  const finding = valued ? (answer?.finding ?? null) : null;
  const fresh = finding !== null && !stale;
  const fault = (field: "quantity" | "claimed") =>
    fresh ? finding.errors.find((error) => error.field === field) : undefined;
  const quantityFault = fault("quantity");
  const claimedFault = fault("claimed");

  return (
    <div>
      <div className="galley-line">
        <div className="galley-text min-w-0">
          <fieldset className="font-ui text-sm">
            <legend className="sr-only">How to type the quantity</legend>
            <div className="flex flex-wrap gap-x-5 border-b border-rule">
              {WAYS.map((choice) => (
                <label
                  key={choice.value}
                  className={cx(
                    "-mb-px inline-flex min-h-11 cursor-pointer items-center border-b-3 border-transparent text-quiet hover:text-ink",
                    "has-checked:border-blue has-checked:text-ink has-focus-visible:outline-2 has-focus-visible:outline-blue",
                  )}
                >
                  <input
                    type="radio"
                    name={`${base}-way`}
                    value={choice.value}
                    checked={way === choice.value}
                    onChange={() => {
                      // The other symbol starts empty, unless what is typed already is one.
                      if (
                        choice.value !== "line" &&
                        claim.quantity !== "" &&
                        !cellsOf(choice.value, claim.quantity)
                      )
                        put({ quantity: "" });
                      setWay(choice.value);
                    }}
                    className="sr-only"
                  />
                  {choice.label}
                </label>
              ))}
            </div>
          </fieldset>

          <div className="mt-7 flex flex-wrap items-center gap-x-4 gap-y-4">
            <div className="min-w-0">
              {way === "line" ? (
                <span className="block font-ui">
                  <label htmlFor={`${base}-quantity`} className="mb-1 block text-sm font-medium">
                    Quantity
                  </label>
                  <input
                    id={`${base}-quantity`}
                    value={claim.quantity}
                    onChange={(event) => put({ quantity: event.target.value })}
                    aria-invalid={quantityFault || errors?.quantity ? true : undefined}
                    aria-describedby={
                      cx(
                        quantityFault && `${base}-fault-quantity`,
                        errors?.quantity && `${base}-error-quantity`,
                      ) || undefined
                    }
                    placeholder={
                      cgOrder === "j1m1j2m2"
                        ? "(1 1 2; 0 0 0) or <1 0 1 0 | 2 0>"
                        : "(1 1 2; 0 0 0) or <1 1 0 0 | 2 0>"
                    }
                    autoComplete="off"
                    autoCapitalize="off"
                    spellCheck={false}
                    maxLength={4000}
                    className="h-11 w-88 max-w-full rounded-sm border border-edge bg-sheet px-3 font-mono text-base placeholder:text-quiet hover:border-ink aria-invalid:border-red"
                  />
                </span>
              ) : (
                <SymbolGrid
                  key={way}
                  id={`${base}-quantity`}
                  kind={way}
                  cgOrder={cgOrder}
                  value={claim.quantity}
                  onChange={(quantity) => put({ quantity })}
                  errorAt={quantityFault ? quantityFault.at : null}
                  describedBy={quantityFault ? `${base}-fault-quantity` : undefined}
                  onOtherKind={(kind, quantity) => {
                    setWay(kind);
                    put({ quantity });
                  }}
                />
              )}
            </div>
            <span
              aria-hidden="true"
              className={cx(
                "text-2xl text-quiet",
                way === "line" ? "mt-6 max-sm:hidden" : "-mt-9 max-sm:mt-0",
              )}
            >
              =
            </span>
            <span className={cx("block min-w-0 font-ui", way !== "line" && "sm:-mt-15")}>
              <label htmlFor={`${base}-claimed`} className="mb-1 block text-sm font-medium text-blue">
                Claimed value
              </label>
              <input
                id={`${base}-claimed`}
                value={claim.claimed}
                onChange={(event) => put({ claimed: event.target.value })}
                aria-invalid={claimedFault || errors?.claimed ? true : undefined}
                aria-describedby={
                  cx(claimedFault && `${base}-fault-claimed`, errors?.claimed && `${base}-error-claimed`) ||
                  undefined
                }
                placeholder="sqrt(2/15)"
                autoComplete="off"
                autoCapitalize="off"
                spellCheck={false}
                maxLength={4000}
                className="h-11 w-56 max-w-full rounded-sm border border-blue bg-sheet px-3 font-mono text-base text-blue placeholder:text-quiet hover:bg-blue-wash aria-invalid:border-red aria-invalid:text-red"
              />
            </span>
          </div>

          {errors?.quantity ? (
            <FieldMessage id={`${base}-error-quantity`}>{errors.quantity}</FieldMessage>
          ) : null}
          {errors?.claimed ? (
            <FieldMessage id={`${base}-error-claimed`}>{errors.claimed}</FieldMessage>
          ) : null}

          <div className="mt-5 grid gap-3">
            {quantityFault ? (
              <FaultLine
                id={`${base}-fault-quantity`}
                text={claim.quantity}
                error={quantityFault}
                onTake={(quantity) => {
                  put({ quantity });
                  if (way !== "line" && !cellsOf(way, quantity)) setWay(wayOf(quantity));
                }}
              />
            ) : null}
            {claimedFault ? (
              <FaultLine
                id={`${base}-fault-claimed`}
                text={claim.claimed}
                error={claimedFault}
                onTake={(claimed) => put({ claimed })}
              />
            ) : null}
            {answer?.html.quantity ? (
              <figure className={cx("transition-opacity", stale && "opacity-45")}>
                <figcaption className="font-ui text-xs text-quiet">as it is read</figcaption>
                <ScrollBox label="the claim as it is read" className="block mt-1 py-1 text-xl">
                  <MathHtml html={answer.html.quantity} />
                  {valued && answer.html.claimed ? (
                    <>
                      {" = "}
                      <span className="text-blue">
                        <MathHtml html={answer.html.claimed} />
                      </span>
                    </>
                  ) : null}
                </ScrollBox>
              </figure>
            ) : null}
          </div>
        </div>

        <div className="galley-notes min-w-0" aria-busy={stale}>
          {failure ? (
            <Notice
              kind="warn"
              title="Not checked"
              live
              action={
                <Button size="small" onClick={retry}>
                  Check again
                </Button>
              }
            >
              {failure}
            </Notice>
          ) : finding && answer ? (
            <FindingNote
              finding={finding}
              html={answer.html}
              className={cx("transition-opacity", stale && "opacity-45")}
            />
          ) : (
            <p className="text-base text-quiet italic">
              {stale && valued
                ? "Reading…"
                : (way === "line" ? claim.quantity.trim() === "" : cellsOf(way, claim.quantity) === null)
                  ? "Fill in the symbol as it is printed."
                  : "Now write the value that the key claims for it."}
            </p>
          )}
          <p role="status" className="sr-only">
            {fresh ? `Verdict: ${VERDICTS[finding.verdict].word}. ${finding.reason}` : ""}
          </p>
        </div>
      </div>
      {answer?.evidence && valued && !stale ? (
        <Disclosure summary="Evidence, to be redone by hand" className="mt-2">
          <EvidenceSheet evidence={answer.evidence} html={answer.html.evidence} />
        </Disclosure>
      ) : null}
    </div>
  );
}

/** How a claim was typed: in the grid where it is a symbol with six entries, otherwise as a line. */
function wayOf(quantity: string): Way {
  if (quantity.trim() === "") return "3j";
  const kind = kindOf(quantity);
  return kind && cellsOf(kind, quantity) ? kind : "line";
}
