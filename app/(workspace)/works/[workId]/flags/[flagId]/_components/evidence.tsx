import { Mark } from "@/components/marks";
import { Math } from "@/components/math";
import { ReggeSquare } from "@/components/regge-square";
import { Disclosure } from "@/components/ui/disclosure";
import type { FlagView } from "@/lib/flags/get-flag";
import type { Proof } from "@/lib/flags/proof";
import { Terms } from "./terms";
import { Variants } from "./variants";

type Kept = NonNullable<Proof["evidence"]>;

/** Everything that a person needs to redo the value by hand; each part unfolds by itself. */
export function Evidence({ flag }: { flag: FlagView }) {
  const { proof } = flag;
  if (!proof)
    return <p className="text-quiet">The quantity could not be read, so there is nothing to recompute.</p>;
  const { evidence, variants } = proof;
  const agreeing = variants?.filter(({ agrees }) => agrees).length ?? 0;
  return (
    <div className="-mt-3 [&>details:first-child]:border-t-0">
      {evidence ? (
        <>
          <Disclosure summary={rulesInWords(evidence)} open={evidence.rules.some(({ holds }) => !holds)}>
            <Rules evidence={evidence} zero={flag.zero.map(({ says }) => says)} />
          </Disclosure>
          {evidence.reggeSquare && evidence.sum !== null ? (
            <Disclosure summary={`The square of the symbol: every row and column sums to ${evidence.sum}`}>
              <ReggeSquare square={evidence.reggeSquare} sum={evidence.sum} />
            </Disclosure>
          ) : null}
          <Disclosure summary={termsInWords(evidence)}>
            <Terms evidence={evidence} />
          </Disclosure>
          <Disclosure summary="From the sum to the value">
            <Steps evidence={evidence} />
          </Disclosure>
          <Disclosure
            summary={`${evidence.routes.length === 2 ? "Two routes agree" : "Route taken"}: ${evidence.routes.map(({ name }) => name).join(", ")}`}
          >
            <ul className="grid gap-1 font-ui text-sm">
              {evidence.routes.map((route) => (
                <li key={route.name} className="flex flex-wrap gap-x-4">
                  <span className="w-56 text-quiet">{route.name}</span>
                  <code className="font-mono break-all">{route.value}</code>
                </li>
              ))}
            </ul>
          </Disclosure>
        </>
      ) : null}
      {variants ? (
        <Disclosure
          summary={
            agreeing === variants.length
              ? `All ${variants.length} related symbols recomputed, all in agreement`
              : `${agreeing} of ${variants.length} related symbols in agreement`
          }
        >
          <Variants variants={variants} kind={proof.kind} />
        </Disclosure>
      ) : (
        <p className="border-y border-rule py-3 font-ui text-sm text-quiet">
          The symbol is too large to set out its 72 relatives here; the run compared both routes.
        </p>
      )}
      {evidence ? (
        <Disclosure summary="Conventions applied">
          <ul className="grid gap-1 text-base">
            {evidence.conventions.map((line) => (
              <li key={line}>{line}</li>
            ))}
          </ul>
        </Disclosure>
      ) : null}
    </div>
  );
}

function rulesInWords({ rules }: Kept): string {
  const broken = rules.filter(({ holds }) => !holds).length;
  if (broken === 0) return "All selection rules hold";
  return broken === 1 ? "One selection rule is broken" : `${broken} selection rules are broken`;
}

function termsInWords({ terms, summary }: Kept): string {
  const count = summary?.count ?? terms.length;
  if (count === 0) return "The sum has no terms: a selection rule makes it zero";
  return count === 1 ? "The sum: one whole number" : `The sum: ${count} whole numbers`;
}

function Rules({ evidence, zero }: { evidence: Kept; zero: string[] }) {
  return (
    <>
      <ul className="grid gap-1.5">
        {evidence.rules.map((rule) => (
          <li key={rule.says} className="flex gap-2.5">
            <Mark
              name={rule.holds ? "confirmed" : "discrepant"}
              size={16}
              label={rule.holds ? "holds" : "broken"}
              className={rule.holds ? "mt-1 text-green" : "mt-1 text-red"}
            />
            <span>{rule.says}</span>
          </li>
        ))}
      </ul>
      {zero.length > 0 ? <p className="mt-3">Therefore it vanishes: {zero.join("; ")}</p> : null}
    </>
  );
}

function Steps({ evidence }: { evidence: Kept }) {
  const { steps, value, sign } = evidence;
  return (
    <div className="grid gap-3">
      {sign ? (
        <p>
          The sign is (−1)<sup>{sign.exponent}</sup> = {sign.value === 1 ? "+1" : "−1"}.
        </p>
      ) : null}
      {steps.map((step) => (
        <Math key={step} own display wide align="start" latex={step} />
      ))}
      <p className="border-t border-rule pt-2">
        <Math own latex={value.latex} />{" "}
        <span className="tabular font-ui text-sm break-all text-quiet">≈ {value.decimal}</span>
      </p>
    </div>
  );
}
