// @vitest-environment jsdom
import { act, cleanup, fireEvent, render, screen } from "@testing-library/react";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";

import { ClaimCheck } from "@/components/claim-check";
import { answerClaim } from "@/lib/check/answer-claim";
import { findingView } from "@/lib/typeset/finding-view";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import { verifyClaim } from "@/lib/verify/verify-claim";

type Asked = {
  quantity: string;
  claimed: string;
  signal: AbortSignal;
  answer: () => void;
  fail: (status: number, detail: string) => void;
  cut: () => void;
};

let asked: Asked[];

/** Stands at the network's edge: each question waits until the test answers it, with what the verifier says. */
function network(_: string, init: RequestInit): Promise<Response> {
  return new Promise((resolve, reject) => {
    const { quantity, claimed } = JSON.parse(String(init.body)) as { quantity: string; claimed: string };
    const json = (status: number, body: unknown) => resolve(new Response(JSON.stringify(body), { status }));
    asked.push({
      quantity,
      claimed,
      signal: init.signal as AbortSignal,
      answer: () => json(200, answerClaim({ quantity, claimed })),
      fail: (status, detail) => json(status, { status, detail }),
      cut: () => reject(new TypeError("fetch failed")),
    });
  });
}

beforeEach(() => {
  asked = [];
  vi.useFakeTimers();
  vi.stubGlobal("fetch", network);
  // jsdom lays nothing out, so there is nothing to observe.
  vi.stubGlobal(
    "ResizeObserver",
    class {
      observe() {}
      disconnect() {}
    },
  );
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

const value = () => screen.getByRole("textbox", { name: "Claimed value" });
const write = (text: string) => fireEvent.change(value(), { target: { value: text } });
const pause = (ms = 300) => act(() => vi.advanceTimersByTimeAsync(ms));
const verdict = () => screen.getByRole("status").textContent;
const START = { quantity: "(1 1 2; 0 0 0)", claimed: "" };

async function answered(n: number) {
  await act(async () => {
    asked[n]?.answer();
    await vi.advanceTimersByTimeAsync(0);
  });
}

describe("checking while typing", () => {
  it("asks once, after a pause, about what stands there then", async () => {
    render(<ClaimCheck initial={START} />);
    for (const text of ["s", "sqrt(2", "sqrt(30)/15"]) {
      write(text);
      await pause(100);
    }
    expect(asked).toHaveLength(0);
    await pause();
    expect(asked.map(({ quantity, claimed }) => [quantity, claimed])).toEqual([
      ["(1 1 2; 0 0 0)", "sqrt(30)/15"],
    ]);
    await answered(0);
    expect(verdict()).toContain("Verdict: confirmed");
  });

  it("asks nothing while the quantity or the value is missing", async () => {
    render(<ClaimCheck initial={START} />);
    await pause(2_000);
    expect(asked).toHaveLength(0);
    expect(screen.getByText("Now write the value that the key claims for it.")).toBeTruthy();
  });

  it("sets a typed line as it is read before a value is written, and gives no verdict yet", async () => {
    const seen: string[] = [];
    render(<ClaimCheck onReading={({ finding }) => seen.push(finding.verdict)} />);
    fireEvent.click(screen.getByRole("radio", { name: "typed line" }));
    fireEvent.change(screen.getByRole("textbox", { name: "Quantity" }), {
      target: { value: "(1 1 2; 0 0 0)" },
    });
    await pause();
    await answered(0);
    expect(screen.getByText("as it is read")).toBeTruthy();
    expect(document.querySelectorAll("figure math")).toHaveLength(1);
    expect(verdict()).toBe("");
    expect(value().getAttribute("aria-invalid")).toBeNull();
    expect(seen).toEqual([]);
  });

  it("says once why a value vanishes", async () => {
    render(<ClaimCheck initial={{ quantity: "(1 1 1; 0 0 0)", claimed: "" }} />);
    write("0");
    await pause();
    await answered(0);
    expect(
      document.querySelector(".galley-notes .grid")?.textContent?.split("its own negative"),
    ).toHaveLength(2);
  });

  it("drops the answer to an older question", async () => {
    render(<ClaimCheck initial={START} />);
    write("1/2");
    await pause();
    write("sqrt(30)/15");
    await pause();
    expect(asked).toHaveLength(2);
    expect(asked[0]?.signal.aborted).toBe(true);
    await answered(1);
    await answered(0);
    expect(verdict()).toContain("Verdict: confirmed");
  });

  it("says which slip made a wrong value, with its formula", async () => {
    const seen: string[] = [];
    render(<ClaimCheck initial={START} onReading={({ finding }) => seen.push(finding.verdict)} />);
    write("sqrt(2/3)");
    await pause();
    await answered(0);
    expect(verdict()).toContain("discrepant");
    expect(screen.getByText(/This is the CG coefficient/)).toBeTruthy();
    expect(document.querySelectorAll(".galley-notes math").length).toBeGreaterThanOrEqual(2);
    expect(seen).toEqual(["discrepant"]);
  });

  it("points at the character and takes the proposal", async () => {
    render(<ClaimCheck initial={START} />);
    write("sqrt(2/15");
    await pause();
    await answered(0);
    expect(value().getAttribute("aria-invalid")).toBe("true");
    fireEvent.click(screen.getByRole("button", { name: /^Take/ }));
    expect((value() as HTMLInputElement).value).toBe("sqrt(2/15)");
    await pause();
    await answered(1);
    expect(verdict()).toContain("confirmed");
    expect(value().getAttribute("aria-invalid")).toBeNull();
  });

  it("shows why there was no answer, keeps what was typed, and asks again", async () => {
    render(<ClaimCheck initial={START} />);
    write("1/2");
    await pause();
    await act(async () => {
      asked[0]?.fail(429, "Thirty checks a minute; go on in 12 seconds.");
      await vi.advanceTimersByTimeAsync(0);
    });
    expect(screen.getByText("Thirty checks a minute; go on in 12 seconds.")).toBeTruthy();
    fireEvent.click(screen.getByRole("button", { name: "Check again" }));
    await pause();
    await act(async () => {
      asked[1]?.cut();
      await vi.advanceTimersByTimeAsync(0);
    });
    expect(screen.getByText(/could not be reached/)).toBeTruthy();
    expect((value() as HTMLInputElement).value).toBe("1/2");
  });

  it("shows an answer that came with the page without asking", async () => {
    const initial = { quantity: "(1 1 2; 0 0 0)", claimed: "sqrt(2/3)" };
    const answer = findingView(verifyClaim({ ref: "x", ...initial }, DEFAULT_CONVENTIONS));
    render(<ClaimCheck initial={initial} initialAnswer={answer} />);
    await pause(2_000);
    expect(asked).toHaveLength(0);
    expect(verdict()).toContain("discrepant");
  });

  it("changes the symbol: the bra-ket starts empty, a pasted one fills it", async () => {
    render(<ClaimCheck initial={START} />);
    fireEvent.paste(screen.getByRole("textbox", { name: "j1" }), {
      clipboardData: { getData: () => "<1 0 1 0 | 2 0>" },
    });
    expect(screen.getByRole("group", { name: "Clebsch-Gordan coefficient" })).toBeTruthy();
    write("sqrt(2/3)");
    await pause();
    expect(asked[0]?.quantity).toBe("<1 0 1 0 | 2 0>");
    fireEvent.click(screen.getByRole("radio", { name: "typed line" }));
    expect(screen.getByRole<HTMLInputElement>("textbox", { name: "Quantity" }).value).toBe("<1 0 1 0 | 2 0>");
  });
});
