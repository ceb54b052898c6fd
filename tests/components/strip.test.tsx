// @vitest-environment jsdom
import { cleanup, render, screen, within } from "@testing-library/react";
import { afterEach, describe, expect, it } from "vitest";

import { ChapterStrip, stripInWords, type StripCell } from "@/components/chapter-strip";
import { ReggeSquare } from "@/components/regge-square";
import { VerdictMark } from "@/components/verdict-mark";
import { VERDICTS, type VerdictId } from "@/components/words";

afterEach(cleanup);

const CELLS: StripCell[] = [
  { id: "a", label: "7.1", verdict: "confirmed", href: "/a" },
  { id: "b", label: "7.2(a)", verdict: "discrepant", href: "/b" },
  { id: "c", label: "7.2(b)", verdict: "confirmed", href: "/c" },
  { id: "d", label: "7.3", verdict: null, href: "/d" },
];

describe("the chapter strip", () => {
  it("says in words what it shows", () => {
    expect(stripInWords(CELLS)).toBe("2 confirmed, 1 discrepant, 1 not checked yet");
  });

  it("has one link a claim, named by its label and verdict, in the order of the chapter", () => {
    render(<ChapterStrip cells={CELLS} label="Chapter 7" />);
    const links = within(screen.getByRole("list", { name: "Chapter 7" })).getAllByRole("link");
    expect(links.map((link) => [link.getAttribute("aria-label"), link.getAttribute("href")])).toEqual([
      ["7.1: confirmed", "/a"],
      ["7.2(a): discrepant", "/b"],
      ["7.2(b): confirmed", "/c"],
      ["7.3: not checked yet", "/d"],
    ]);
  });

  it("is one picture with its counts when compact", () => {
    render(<ChapterStrip cells={CELLS} label="Chapter 7" compact />);
    expect(screen.getByRole("img").getAttribute("aria-label")).toBe(
      "Chapter 7: 2 confirmed, 1 discrepant, 1 not checked yet",
    );
  });

  it("says so when there is nothing to show", () => {
    render(<ChapterStrip cells={[]} label="Chapter 7" />);
    expect(screen.getByText("No claims yet.")).toBeTruthy();
  });
});

describe("a verdict", () => {
  it.each(Object.keys(VERDICTS) as VerdictId[])(
    "%s has a word even where only its mark is seen",
    (verdict) => {
      render(<VerdictMark verdict={verdict} />);
      expect(screen.getByRole("img", { name: VERDICTS[verdict].word })).toBeTruthy();
      cleanup();
      render(<VerdictMark verdict={verdict} withWord />);
      expect(screen.getByText(VERDICTS[verdict].word)).toBeTruthy();
      expect(screen.queryByRole("img")).toBeNull();
    },
  );

  it("draws a mark of its own for each", () => {
    const drawings = (Object.keys(VERDICTS) as VerdictId[]).map((verdict) => {
      const { container } = render(<VerdictMark verdict={verdict} />);
      return container.querySelector("svg")?.innerHTML;
    });
    expect(new Set(drawings).size).toBe(drawings.length);
  });
});

it("the square shows the sums of its rows and columns", () => {
  render(
    <ReggeSquare
      square={[
        [2, 2, 0],
        [1, 1, 2],
        [1, 1, 2],
      ]}
      sum={4}
    />,
  );
  const table = screen.getByRole("table");
  expect(table.textContent?.match(/row sum 4/g)).toHaveLength(3);
  expect(table.textContent?.match(/column sum 4/g)).toHaveLength(3);
  expect(screen.getByText(/sums to 4 = /)).toBeTruthy();
});
