// @vitest-environment jsdom
import { cleanup, fireEvent, render, screen } from "@testing-library/react";
import { useState } from "react";
import { afterEach, describe, expect, it } from "vitest";

import { SymbolGrid } from "@/components/symbol-grid";
import type { CgOrder, SymbolKind } from "@/components/symbol-notation";

afterEach(cleanup);

function Form({
  kind,
  start = "",
  cgOrder,
  errorAt,
  other,
}: {
  kind: SymbolKind;
  start?: string;
  cgOrder?: CgOrder;
  errorAt?: number;
  other?: (kind: string, text: string) => void;
}) {
  const [text, setText] = useState(start);
  return (
    <>
      <SymbolGrid
        kind={kind}
        cgOrder={cgOrder}
        value={text}
        onChange={setText}
        errorAt={errorAt}
        onOtherKind={other}
      />
      <output>{text}</output>
      <button type="button" onClick={() => setText("(2 2 4; 1 1 -2)")}>
        other value
      </button>
    </>
  );
}

const cell = (name: string) => screen.getByRole<HTMLInputElement>("textbox", { name });
const notation = () => screen.getByRole("status").textContent;
const type = (name: string, text: string) => fireEvent.change(cell(name), { target: { value: text } });
const paste = (name: string, text: string) =>
  fireEvent.paste(cell(name), { clipboardData: { getData: () => text } });

describe("the grid of a 3j symbol", () => {
  it("shows a value in six named cells, in reading order", () => {
    render(<Form kind="3j" start="(1 1 2; 0 1/2 -1/2)" />);
    expect(screen.getByRole("group", { name: "3j symbol" })).toBeTruthy();
    const cells = screen.getAllByRole<HTMLInputElement>("textbox");
    expect(cells.map((c) => c.getAttribute("aria-label"))).toEqual(["j1", "j2", "j3", "m1", "m2", "m3"]);
    expect(cells.map((c) => c.value)).toEqual(["1", "1", "2", "0", "1/2", "-1/2"]);
    expect(cells.every((c) => c.tabIndex === 0)).toBe(true);
  });

  it("tells its owner the typed notation of what is filled in so far", () => {
    render(<Form kind="3j" />);
    type("j1", "1");
    expect(notation()).toBe("(1  ;   )");
    for (const [name, text] of [
      ["j2", "1"],
      ["j3", "2"],
      ["m1", "0"],
      ["m2", "0"],
      ["m3", "0"],
    ] as const)
      type(name, text);
    expect(notation()).toBe("(1 1 2; 0 0 0)");
    type("m1", "/");
    expect(cell("m1").value).toBe("1/2");
    expect(notation()).toBe("(1 1 2; 1/2 0 0)");
  });

  it("walks between the cells with the arrow keys and stays inside", () => {
    render(<Form kind="3j" start="(1 1 2; 0 0 0)" />);
    cell("j2").focus();
    const press = (key: string) => fireEvent.keyDown(document.activeElement as Element, { key });
    const here = () => document.activeElement?.getAttribute("aria-label");
    press("ArrowDown");
    expect(here()).toBe("m2");
    press("ArrowRight");
    expect(here()).toBe("m3");
    press("ArrowUp");
    expect(here()).toBe("j3");
    press("ArrowUp");
    expect(here()).toBe("j3");
    press("ArrowLeft");
    expect(here()).toBe("j2");
  });

  it("does not leave a cell while the caret is inside its text", () => {
    render(<Form kind="3j" start="(11 1 2; 0 0 0)" />);
    cell("j1").focus();
    cell("j1").setSelectionRange(1, 1);
    fireEvent.keyDown(cell("j1"), { key: "ArrowRight" });
    expect(document.activeElement).toBe(cell("j1"));
  });

  it("goes on to the next cell at a space and back from an empty one", () => {
    render(<Form kind="3j" />);
    cell("j1").focus();
    type("j1", "1 ");
    expect(cell("j1").value).toBe("1");
    expect(document.activeElement).toBe(cell("j2"));
    fireEvent.keyDown(cell("j2"), { key: "Backspace" });
    expect(document.activeElement).toBe(cell("j1"));
  });

  it.each(["(1 1 2; 0 0 0)", "\\begin{pmatrix}1&1&2\\\\0&0&0\\end{pmatrix}"])(
    "is filled by pasting %s",
    (text) => {
      render(<Form kind="3j" />);
      paste("m2", text);
      expect(notation()).toBe("(1 1 2; 0 0 0)");
    },
  );

  it("takes some pasted entries from the cell on", () => {
    render(<Form kind="3j" start="(1 1 2; 9 9 9)" />);
    paste("m1", "½ −½ 0");
    expect(notation()).toBe("(1 1 2; 1/2 -1/2 0)");
  });

  it("leaves other pasted text to the cell", () => {
    render(<Form kind="3j" start="(1 1 2; 0 0 0)" />);
    expect(paste("j1", "hello there")).toBe(true);
    expect(notation()).toBe("(1 1 2; 0 0 0)");
  });

  it("hands a pasted symbol of the other kind to its owner", () => {
    const seen: string[][] = [];
    render(<Form kind="3j" other={(kind, text) => seen.push([kind, text])} />);
    paste("j1", "<1 0 1 0 | 2 0>");
    expect(seen).toEqual([["cg", "<1 0 1 0 | 2 0>"]]);
  });

  it("marks the cell in which reading failed, and only that", () => {
    render(<Form kind="3j" start="(1 1 2; 0 7 0)" errorAt={"(1 1 2; 0 7 0)".indexOf("7")} />);
    const marked = screen.getAllByRole("textbox").filter((c) => c.getAttribute("aria-invalid") === "true");
    expect(marked).toEqual([cell("m2")]);
  });

  it("follows a value set from outside", () => {
    render(<Form kind="3j" start="(1 1 2; 0 0 0)" />);
    fireEvent.click(screen.getByRole("button", { name: "other value" }));
    expect(cell("j3").value).toBe("4");
    expect(cell("m3").value).toBe("-2");
  });

  it("has keys for the sign and the half that a number pad lacks", () => {
    render(<Form kind="3j" start="(1 1 2; 3 0 0)" />);
    fireEvent.focus(cell("m1"));
    fireEvent.click(screen.getByRole("button", { name: "Make a half of this cell" }));
    fireEvent.click(screen.getByRole("button", { name: "Change the sign of this cell" }));
    expect(notation()).toBe("(1 1 2; -3/2 0 0)");
    expect(document.activeElement).toBe(cell("m1"));
    expect(cell("m1").inputMode).toBe("decimal");
  });
});

describe("the bra-ket of a Clebsch-Gordan coefficient", () => {
  it("has its cells in the order of the work", () => {
    render(<Form kind="cg" cgOrder="j1j2m1m2" start="<1 2 0 -1 | 2 -1>" />);
    expect(screen.getAllByRole("textbox").map((c) => c.getAttribute("aria-label"))).toEqual([
      "j1",
      "j2",
      "m1",
      "m2",
      "J",
      "M",
    ]);
    type("M", "0");
    expect(notation()).toBe("<1 2 0 -1 | 2 0>");
  });
});
