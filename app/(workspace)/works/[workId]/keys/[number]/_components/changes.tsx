import { Math } from "@/components/math";
import { Section } from "@/components/ui/page";
import { ScrollBox } from "@/components/ui/scroll-box";
import type { KeyChanges } from "@/lib/keys/compare-keys";
import type { KeyClaim } from "@/lib/keys/key-content";

/** What this key says that the one before it did not. */
export function Changes({ changes, previous }: { changes: KeyChanges; previous: string }) {
  const { added, gone, changed, same, conventions } = changes;
  const nothing = added.length + gone.length + changed.length + conventions.length === 0;
  return (
    <Section title={`Since key ${previous}`} id="changes" className="mt-12" aside={`${same} unchanged`}>
      {nothing ? <p className="text-quiet">Every answer is the same.</p> : null}
      {conventions.length > 0 ? <p className="mb-3">The conventions sheet was changed.</p> : null}
      <ul>
        {changed.map(({ before, after }) => (
          <li
            key={after.id}
            className="grid gap-x-6 border-b border-rule py-2.5 sm:grid-cols-[6rem_minmax(0,1fr)] sm:items-center"
          >
            <b className="old-style font-semibold">{after.ref}</b>
            <ScrollBox label="before and after" className="flex min-w-0 flex-wrap items-center gap-x-4 py-1">
              <del className="text-quiet decoration-red">
                <Printed claim={before} />
              </del>
              <span className="sr-only">now</span>
              <ins className="no-underline">
                <Printed claim={after} />
              </ins>
            </ScrollBox>
          </li>
        ))}
      </ul>
      {added.length > 0 ? <Refs label="New" claims={added} /> : null}
      {gone.length > 0 ? <Refs label="No longer in the key" claims={gone} /> : null}
    </Section>
  );
}

function Printed({ claim }: { claim: KeyClaim }) {
  return (
    <>
      {claim.quantityLatex ? <Math own latex={claim.quantityLatex} /> : claim.quantity}
      {" = "}
      {claim.answer.latex ? <Math own latex={claim.answer.latex} /> : claim.answer.text}
    </>
  );
}

function Refs({ label, claims }: { label: string; claims: readonly KeyClaim[] }) {
  return (
    <p className="mt-3">
      <span className="text-quiet">{label}: </span>
      <span className="old-style">{claims.map(({ ref }) => ref).join(", ")}</span>
    </p>
  );
}
