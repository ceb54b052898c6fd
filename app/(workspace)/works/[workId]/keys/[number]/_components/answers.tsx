import { Math } from "@/components/math";
import { VerdictMark } from "@/components/verdict-mark";
import { SettleMark } from "@/components/verdict-mark";
import { ScrollBox } from "@/components/ui/scroll-box";
import type { KeyClaim, KeyContent } from "@/lib/keys/key-content";

/** The answers as they would stand at the back of the book: by chapter, in two columns where there is room. */
export function Answers({ content }: { content: KeyContent }) {
  const chapters = content.chapters
    .map((chapter) => ({
      chapter,
      claims: content.claims.filter((claim) => claim.chapter === chapter.number),
    }))
    .filter(({ claims }) => claims.length > 0);
  return (
    <div className="grid gap-12">
      {chapters.map(({ chapter, claims }) => (
        <section key={chapter.number} aria-labelledby={`chapter-${chapter.number}`}>
          <h2 id={`chapter-${chapter.number}`} className="mb-4 border-b border-ink pb-1.5 text-xl">
            <span className="old-style text-quiet">{chapter.number}</span>
            <span className="ml-3">{chapter.title}</span>
          </h2>
          <ul className="gap-x-12 md:columns-2">
            {claims.map((claim) => (
              <Answer key={claim.id} claim={claim} />
            ))}
          </ul>
        </section>
      ))}
    </div>
  );
}

function Answer({ claim }: { claim: KeyClaim }) {
  const { quantityLatex, answer, settlement, waiver } = claim;
  return (
    <li className="grid break-inside-avoid grid-cols-[4.5rem_minmax(0,1fr)_auto] items-center gap-x-3 border-b border-rule py-2">
      <b className="old-style font-semibold break-words">{claim.ref}</b>
      <ScrollBox label="the answer" className="block min-w-0 py-0.5">
        {quantityLatex ? (
          <Math own latex={quantityLatex} />
        ) : (
          <code className="font-mono text-sm">{claim.quantity}</code>
        )}
        {" = "}
        {answer.latex ? (
          <Math own latex={answer.latex} />
        ) : (
          <code className="font-mono text-sm">{answer.text}</code>
        )}
      </ScrollBox>
      {waiver ? (
        <a href="#settled" className="font-ui text-xs no-underline">
          <VerdictMark verdict="undecided" />
        </a>
      ) : settlement ? (
        <a href="#settled" className="no-underline">
          <SettleMark word={settlement.word} withWord={false} />
        </a>
      ) : null}
    </li>
  );
}
