/** The words that every screen uses for the same things, with what each means in one sentence. */

export type VerdictId =
  "confirmed" | "confirmed-not-house-form" | "discrepant" | "contradicted" | "unreadable" | "undecided";

export type Tone = "green" | "amber" | "red" | "quiet" | "blue" | "ink";

export const VERDICTS: Record<VerdictId, { word: string; short: string; tone: Tone; means: string }> = {
  confirmed: {
    word: "confirmed",
    short: "confirmed",
    tone: "green",
    means: "The claimed value equals the recomputed one exactly and is written in the house form.",
  },
  "confirmed-not-house-form": {
    word: "confirmed, not in house form",
    short: "not in house form",
    tone: "amber",
    means:
      "The claimed value equals the recomputed one exactly, but is not written the way the conventions sheet asks.",
  },
  discrepant: {
    word: "discrepant",
    short: "discrepant",
    tone: "red",
    means: "The claimed value is not the recomputed one. A second author settles it.",
  },
  contradicted: {
    word: "contradicted",
    short: "contradicted",
    tone: "red",
    means: "Another claim of the work says otherwise under a symmetry: the two cannot both be right.",
  },
  unreadable: {
    word: "unreadable",
    short: "unreadable",
    tone: "amber",
    means: "The claim cannot be read as written. The place where reading stopped is shown.",
  },
  undecided: {
    word: "undecided",
    short: "undecided",
    tone: "quiet",
    means: "A convention is missing, or a stated limit is passed. Nothing is said about the value.",
  },
};

export type SettleId = "correct" | "stet" | "reword" | "withdraw";

export const SETTLE_WORDS: Record<SettleId, { word: string; means: string }> = {
  correct: { word: "correct", means: "Take the recomputed value." },
  stet: { word: "stet", means: "Let it stand, with the convention or the reason it relies on." },
  reword: { word: "reword", means: "The problem itself changes." },
  withdraw: { word: "withdraw", means: "The claim leaves the key." },
};

export const TONE_TEXT: Record<Tone, string> = {
  green: "text-green",
  amber: "text-amber",
  red: "text-red",
  quiet: "text-quiet",
  blue: "text-blue",
  ink: "text-ink",
};

export const TONE_WASH: Record<Tone, string> = {
  green: "bg-green-wash",
  amber: "bg-amber-wash",
  red: "bg-red-wash",
  quiet: "bg-sunk",
  blue: "bg-blue-wash",
  ink: "bg-sheet",
};

export const CAUTIONS = [
  "Surdmark verifies values, not the physics or the wording of a problem.",
  "A person signs each frozen key.",
  "Conventions differ between books: a stet names the one it relies on.",
  "Unpublished exam material is confidential; exports carry who made them and when.",
] as const;
