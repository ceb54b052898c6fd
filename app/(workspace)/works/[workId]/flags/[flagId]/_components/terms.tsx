import { Math } from "@/components/math";
import { Cell, ColumnHead, TableFrame } from "@/components/ui/table";
import type { Proof } from "@/lib/flags/proof";

type Kept = NonNullable<Proof["evidence"]>;

/** The closed formula and its whole-number terms, added up. */
export function Terms({ evidence }: { evidence: Kept }) {
  const { terms, summary, formula, total } = evidence;
  const shown = summary ? [summary.first, summary.largest, summary.last] : terms;
  return (
    <>
      <Math own display wide align="start" latex={formula.latex} />
      <p className="mt-1 mb-4 font-ui text-xs text-quiet">{formula.source}</p>
      {shown.length > 0 ? (
        <div className="max-w-sheet">
          <TableFrame
            caption={summary ? `First, largest and last of ${summary.count} terms` : "Terms of the sum"}
            captionHidden={!summary}
          >
            <thead role="rowgroup">
              <tr role="row">
                <ColumnHead>k</ColumnHead>
                <ColumnHead>Binomials</ColumnHead>
                <ColumnHead align="end">Whole term</ColumnHead>
              </tr>
            </thead>
            <tbody role="rowgroup">
              {shown.map((term, i) => (
                <tr key={`${term.k} ${i}`} role="row">
                  <Cell rowHeader label="k">
                    {term.k}
                  </Cell>
                  <Cell label="Binomials">
                    <Math own latex={binomials(term)} />
                  </Cell>
                  <Cell align="end" label="Whole term">
                    <span className="break-all">{term.value.replace(/^-/, "−")}</span>
                  </Cell>
                </tr>
              ))}
            </tbody>
          </TableFrame>
          <p className="tabular mt-2 text-right font-ui text-sm break-all">
            sum <b>{total.replace(/^-/, "−")}</b>
          </p>
        </div>
      ) : null}
    </>
  );
}

/** (−1)^k times the three binomials of the formula, with the numbers put in. */
function binomials({ k, binomials: three }: Kept["terms"][number]): string {
  const product = three.map(({ over, under }) => `\\tbinom{${over}}{${under}}`).join("");
  return k % 2 === 0 ? product : `-${product}`;
}
