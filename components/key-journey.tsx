import type { ReactNode } from "react";

import { cx } from "@/components/cx";
import { Math } from "@/components/math";
import { Mark } from "@/components/marks";

/** How a key travels, drawn as four proofs of the same line: written, marked, settled, sealed. */
export function KeyJourney() {
  return (
    <ol className="grid gap-x-7 gap-y-10 sm:grid-cols-2 lg:grid-cols-4">
      <Stage
        number={1}
        title="An author writes a claim"
        pencil="blue"
        says="In a grid that looks like the printed symbol, or as a file of hundreds."
      >
        <Line struck={false}>
          <span className="text-blue">
            <Math latex="\sqrt{\tfrac{2}{3}}" />
          </span>
        </Line>
      </Stage>
      <Stage
        number={2}
        title="The verifier writes its finding"
        pencil="red"
        says="Recomputed exactly by two routes; a wrong value comes with the slip that made it."
      >
        <Line struck>
          <span className="text-blue">
            <Math latex="\sqrt{\tfrac{2}{3}}" />
          </span>
        </Line>
        <MarginScrawl>
          <Mark name="discrepant" size={22} />
          <Math latex="\tfrac{\sqrt{30}}{15}" />
        </MarginScrawl>
      </Stage>
      <Stage
        number={3}
        title="A second author settles it"
        pencil="blue"
        says="Correct, stet, reword or withdraw: one word, and never on one's own claim."
      >
        <Line struck>
          <span className="text-blue">
            <Math latex="\sqrt{\tfrac{2}{3}}" />
          </span>
        </Line>
        <MarginScrawl>
          <Mark name="correct" size={22} className="text-blue" />
          <span className="text-sm text-blue italic">correct</span>
        </MarginScrawl>
      </Stage>
      <Stage
        number={4}
        title="The lead freezes the key"
        pencil="red"
        says="Numbered, unchangeable, with its evidence; production downloads it for print."
      >
        <Line struck={false}>
          <Math latex="\tfrac{\sqrt{30}}{15}" />
        </Line>
        <MarginScrawl>
          <Mark name="seal" size={40} />
        </MarginScrawl>
      </Stage>
    </ol>
  );
}

function Stage({
  number,
  title,
  says,
  pencil,
  children,
}: {
  number: number;
  title: string;
  says: string;
  pencil: "blue" | "red";
  children: ReactNode;
}) {
  return (
    <li className="relative">
      <div aria-hidden="true" className="sheet flex h-36 items-stretch overflow-hidden">
        <div className="grid flex-1 content-center gap-2.5 pr-20 pl-3.5">{children}</div>
      </div>
      <h3 className="mt-3 flex items-baseline gap-2 text-lg leading-snug">
        <span
          className={cx(
            "old-style shrink-0 text-2xl leading-none",
            pencil === "blue" ? "text-blue" : "text-red",
          )}
        >
          {number}
        </span>
        {title}
      </h3>
      <p className="mt-1 text-base leading-snug text-quiet">{says}</p>
    </li>
  );
}

/** A line of the work among two lines of plain type. */
function Line({ struck, children }: { struck: boolean; children: ReactNode }) {
  return (
    <>
      <span className="block h-px w-4/5 bg-rule" />
      <span className="flex items-center gap-1.5 text-sm whitespace-nowrap">
        <Math latex="\begin{pmatrix}1&1&2\\0&0&0\end{pmatrix}=" />
        <span className="relative">
          {children}
          {struck ? (
            <svg
              viewBox="0 0 40 30"
              preserveAspectRatio="none"
              className="absolute -inset-x-1 inset-y-0 h-full w-[calc(100%+0.5rem)] text-red"
              fill="none"
              stroke="currentColor"
              strokeWidth="2.2"
              strokeLinecap="round"
            >
              <path d="M2 26C14 20 26 12 38 3" vectorEffect="non-scaling-stroke" />
            </svg>
          ) : null}
        </span>
      </span>
      <span className="block h-px w-3/5 bg-rule" />
    </>
  );
}

function MarginScrawl({ children }: { children: ReactNode }) {
  return (
    <span className="absolute top-0 right-0 grid h-36 w-17 place-items-center content-center gap-1.5 border-l-3 border-double border-rule text-red">
      {children}
    </span>
  );
}
