import { MathHtml } from "@/components/math-html";
import { Mark } from "@/components/marks";
import { ReggeSquare } from "@/components/regge-square";
import type { Evidence, EvidenceTerm } from "@/lib/symbols/kinds";
import type { EvidenceHtml } from "@/lib/typeset/evidence-view";

/**
 * The evidence of one value, to be redone with pencil and paper: selection rules, the square, the integer terms of the
 * sum, the steps to the printed value, the two routes and the conventions. `html` holds its formulas as our server set them.
 */
export function EvidenceSheet({ evidence, html }: { evidence: Evidence; html: EvidenceHtml | null }) {
  const { terms, summary } = evidence;
  return (
    <div className="grid gap-6 font-ui text-sm">
      <Part title="Selection rules">
        <ul className="grid gap-x-8 gap-y-1.5 sm:grid-cols-2 lg:grid-cols-3">
          {evidence.rules.map((rule) => (
            <li key={rule.says} className={rule.holds ? "flex gap-2" : "flex gap-2 text-red"}>
              <Mark
                name={rule.holds ? "confirmed" : "discrepant"}
                size={16}
                label={rule.holds ? "holds" : "fails"}
                className={rule.holds ? "mt-0.5 text-green" : "mt-0.5"}
              />
              <span>{rule.says}</span>
            </li>
          ))}
        </ul>
      </Part>

      {evidence.reggeSquare && evidence.sum !== null ? (
        <Part title="The square of the symbol">
          <ReggeSquare square={evidence.reggeSquare} sum={evidence.sum} />
        </Part>
      ) : null}

      {html ? (
        <Part title="The formula">
          <MathHtml html={html.formula} display wide align="start" />
          <p className="text-xs text-quiet">{evidence.formula.source}</p>
        </Part>
      ) : null}

      {terms.length > 0 || summary ? (
        <Part title="The integer terms of the sum">
          <TermTable
            terms={summary ? [summary.first, summary.largest, summary.last] : terms}
            names={summary ? ["first", "largest", "last"] : null}
            total={evidence.total}
          />
          {summary ? (
            <p className="mt-1.5 text-xs text-quiet">
              The sum has {summary.count} terms; three of them are shown.
            </p>
          ) : null}
        </Part>
      ) : null}

      {html && html.steps.length > 0 ? (
        <Part title="From the sum to the value">
          {html.steps.map((step, i) => (
            <MathHtml key={i} html={step} display wide align="start" />
          ))}
        </Part>
      ) : null}

      <Part title="Two independent routes">
        <ul className="grid gap-1">
          {evidence.routes.map((route) => (
            <li key={route.name} className="flex flex-wrap justify-between gap-x-4">
              <span>{route.name}</span>
              <span className="font-mono">{route.value}</span>
            </li>
          ))}
        </ul>
      </Part>

      <Part title="Conventions applied">
        <ul className="grid gap-1">
          {evidence.conventions.map((convention) => (
            <li key={convention}>{convention}</li>
          ))}
        </ul>
        <p className="mt-1.5 text-xs text-quiet">Engine {evidence.version}</p>
      </Part>
    </div>
  );
}

function Part({ title, children }: { title: string; children: React.ReactNode }) {
  return (
    <section>
      <h4 className="small-caps mb-1.5 border-b border-rule text-base text-quiet">{title}</h4>
      {children}
    </section>
  );
}

function TermTable({
  terms,
  names,
  total,
}: {
  terms: readonly EvidenceTerm[];
  names: string[] | null;
  total: string;
}) {
  return (
    <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Terms of the sum">
      <table className="tabular w-full border-collapse text-right">
        <caption className="sr-only">Terms of the sum over k, each as a whole number</caption>
        <thead>
          <tr className="border-y border-ink text-xs text-quiet">
            <th scope="col" className="py-1 pr-4 text-left font-medium">
              k
            </th>
            <th scope="col" className="py-1 pr-4 font-medium">
              binomials
            </th>
            <th scope="col" className="py-1 font-medium">
              term
            </th>
          </tr>
        </thead>
        <tbody>
          {terms.map((term, i) => (
            <tr key={i} className="border-b border-rule">
              <th scope="row" className="py-1 pr-4 text-left font-normal">
                {term.k}
                {names ? <span className="text-quiet"> ({names[i]})</span> : null}
              </th>
              <td className="py-1 pr-4 whitespace-nowrap">
                {term.binomials.map((b, k) => (
                  <span key={k}>
                    {k > 0 ? " · " : ""}
                    <span aria-label={`${b.over} over ${b.under}`}>
                      C({b.over}, {b.under})
                    </span>
                  </span>
                ))}
              </td>
              <td className="max-w-60 py-1 break-all">{minus(term.value)}</td>
            </tr>
          ))}
        </tbody>
        <tfoot>
          <tr className="border-b border-ink">
            <th scope="row" colSpan={2} className="py-1 pr-4 text-left font-medium">
              Sum of all terms
            </th>
            <td className="py-1 font-semibold break-all">{minus(total)}</td>
          </tr>
        </tfoot>
      </table>
    </div>
  );
}

/** A printed minus sign for a figure in text. */
function minus(figure: string): string {
  return figure.replace(/^-/, "−");
}
