import { Mark } from "@/components/marks";
import type { Proof, VariantRow } from "@/lib/flags/proof";

/**
 * The related symbols, each recomputed by itself. Seventy-two formulas would make a heavy page, so these small symbols are
 * set with plain type instead of the typesetter.
 */
export function Variants({ variants, kind }: { variants: readonly VariantRow[]; kind: Proof["kind"] }) {
  return (
    <ol className="grid grid-cols-[repeat(auto-fill,minmax(17rem,1fr))] gap-x-8 font-work">
      {variants.map((variant, i) => (
        <li
          key={`${variant.name} ${i}`}
          className="grid grid-cols-[2rem_minmax(0,1fr)_auto] items-center gap-x-3 border-b border-rule py-2"
        >
          <span className="tabular font-ui text-xs text-quiet">{i + 1}</span>
          <span className="min-w-0" title={variant.does}>
            <SmallSymbol entries={variant.entries} kind={kind} />
            <span className="block font-ui text-xs text-quiet">{variant.name}</span>
          </span>
          <span className="flex items-center gap-2 text-right text-sm">
            <span className="tabular" title={variant.value}>
              {variant.phase === 1 ? "+" : "−"}
              {variant.factor ?? "1"}
            </span>
            <Mark
              name={variant.agrees ? "confirmed" : "discrepant"}
              size={15}
              label={variant.agrees ? "agrees" : "differs"}
              className={variant.agrees ? "text-green" : "text-red"}
            />
          </span>
        </li>
      ))}
    </ol>
  );
}

const minus = (entry: string) => entry.replace(/^-/, "−");

/** A 2×3 array in parentheses, or a bra-ket, in the size of the line. */
function SmallSymbol({ entries, kind }: { entries: readonly string[]; kind: Proof["kind"] }) {
  if (kind === "cg")
    return (
      <span className="whitespace-nowrap">
        ⟨{entries.slice(0, 4).map(minus).join(" ")} | {entries.slice(4).map(minus).join(" ")}⟩
      </span>
    );
  return (
    <span className="inline-grid grid-cols-[repeat(3,auto)] gap-x-2.5 rounded-[0.6rem] border-x border-ink px-2 text-center text-sm leading-tight">
      {entries.map((entry, i) => (
        <span key={i}>{minus(entry)}</span>
      ))}
    </span>
  );
}
