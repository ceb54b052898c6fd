import { describe, expect, it } from "vitest";
import { DEFAULT_CONVENTIONS } from "@/lib/verify/conventions";
import { readQuantity } from "@/lib/verify/read-quantity";
import { readValue } from "@/lib/verify/read-value";
import { verifyClaim } from "@/lib/verify/verify-claim";
import { randomFrom, type Random } from "./random";

const SEED = Number(process.env.FUZZ_SEED ?? 20_261_201);
const PIECES = [
  ..."0123456789().,;|<>{}[]+-*/^√½⅓πi −⟨⟩²⁻¹!:=\\'\"…\0\ud800\u202e",
  "sqrt",
  "sqrt(",
  "pi",
  "(1 1 2; 0 0 0)",
  "<1 0 1 0 | 2 0>",
  "1/2",
  "3/2",
  "__proto__",
  "import",
  "0.5",
  "e5",
  "||",
  "\n",
  "\u{1F600}",
];
const SOUND = [
  "(1 1 2; 0 0 0)",
  "<1/2 1/2 1 -1 | 1/2 -1/2>",
  "sqrt(2/15)",
  "-2*sqrt(30)/15",
  "1/(2 sqrt(3))",
  "30^(-1/2)",
  "0.3651",
  "(1+√2)^2",
];

function fuzzed(random: Random): string {
  if (random.next() < 0.5)
    return Array.from({ length: random.whole(0, 24) }, () => random.pick(PIECES)).join("");
  let text = random.pick(SOUND);
  for (let n = random.whole(1, 4); n > 0; n--) {
    const at = random.whole(0, text.length);
    text =
      text.slice(0, at) +
      (random.next() < 0.6 ? random.pick(PIECES) : "") +
      text.slice(at + random.whole(0, 2));
  }
  return text;
}

describe(`20,000 fuzzed texts (FUZZ_SEED=${SEED})`, () => {
  it("never throw, and errors point inside the text", () => {
    const random = randomFrom(SEED);
    let read = 0;
    for (let n = 0; n < 20_000; n++) {
      const text = fuzzed(random);
      for (const reading of [readQuantity(text, DEFAULT_CONVENTIONS), readValue(text, DEFAULT_CONVENTIONS)]) {
        if (reading.ok) {
          read += 1;
          continue;
        }
        const { at, length, says, found, expected } = reading.error;
        const sound =
          at >= 0 &&
          length >= 0 &&
          at + length <= text.length &&
          says.length > 10 &&
          found !== "" &&
          expected !== "";
        if (!sound) expect({ text, error: reading.error }).toBe("inside the text");
      }
    }
    expect(read).toBeGreaterThan(500);
  });

  it("are verified without a throw", () => {
    const random = randomFrom(SEED + 1);
    for (let n = 0; n < 1_000; n++) {
      const finding = verifyClaim(
        {
          ref: "1",
          quantity: random.next() < 0.5 ? "(1 1 2; 0 0 0)" : fuzzed(random),
          claimed: fuzzed(random),
        },
        DEFAULT_CONVENTIONS,
        { largestJ: 200 },
      );
      expect(finding.reason).not.toBe("");
    }
  });
});
