"use client";

import { useEffect, useState } from "react";

import type { CheckAnswer } from "@/components/check-answer";
import type { Conventions } from "@/lib/verify/conventions";

export type Claim = { quantity: string; claimed: string };

export type CheckState = {
  /** The newest answer; `stale` while a newer question is under way. */
  answer: CheckAnswer | null;
  stale: boolean;
  /** Why there is no answer, as a sentence for people. */
  failure: string | null;
  retry: () => void;
};

const PAUSE = 300;

type Problem = { detail?: string; title?: string };

async function ask(
  claim: Claim,
  conventions: Partial<Conventions> | undefined,
  signal: AbortSignal,
): Promise<CheckAnswer> {
  const response = await fetch("/api/check", {
    method: "POST",
    headers: { "content-type": "application/json", accept: "application/json" },
    body: JSON.stringify({ ...claim, conventions }),
    signal,
  });
  if (response.ok) return (await response.json()) as CheckAnswer;
  const problem = (await response.json().catch(() => ({}))) as Problem;
  const wait = response.headers.get("retry-after");
  if (response.status === 429)
    throw new Error(
      problem.detail ??
        `Too many checks just now. ${wait ? `Go on in ${wait} seconds.` : "Go on in a minute."}`,
    );
  throw new Error(problem.detail ?? problem.title ?? `The check was not carried out (${response.status}).`);
}

/**
 * Asks the verifier about a claim while it is typed: after a pause of 300 ms, one question at a time. A question that a
 * newer one has overtaken is abandoned, and its answer is dropped should it still come. Nothing is asked until `complete`.
 */
export function useCheck(
  claim: Claim,
  complete: boolean,
  conventions: Partial<Conventions> | undefined,
  initial: CheckAnswer | null,
  onAnswer?: (answer: CheckAnswer) => void,
): CheckState {
  const key = JSON.stringify([claim.quantity, claim.claimed, conventions]);
  const [known, setKnown] = useState<{ key: string; answer: CheckAnswer | null; failure: string | null }>({
    key: initial ? key : "",
    answer: initial,
    failure: null,
  });
  const [attempt, setAttempt] = useState(0);
  const asked = known.key === key;

  useEffect(() => {
    if (!complete || asked) return;
    const abort = new AbortController();
    const [quantity, claimed, sheet] = JSON.parse(key) as [string, string, Partial<Conventions> | undefined];
    const timer = setTimeout(() => {
      ask({ quantity, claimed }, sheet ?? undefined, abort.signal).then(
        (answer) => {
          if (abort.signal.aborted) return;
          setKnown({ key, answer, failure: null });
          onAnswer?.(answer);
        },
        (error: unknown) => {
          if (abort.signal.aborted) return;
          const offline = error instanceof TypeError;
          const failure = offline
            ? "The verifier could not be reached. What you typed is kept."
            : error instanceof Error
              ? error.message
              : "The check was not carried out.";
          setKnown((before) => ({ key, answer: before.answer, failure }));
        },
      );
    }, PAUSE);
    return () => {
      clearTimeout(timer);
      abort.abort();
    };
    // The answer's receiver may change with every drawing of its owner; only a new question starts a new check.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [key, complete, asked, attempt]);

  return {
    answer: complete ? known.answer : null,
    stale: complete && !asked,
    failure: complete && asked ? known.failure : null,
    retry: () => {
      setKnown((before) => ({ ...before, key: "" }));
      setAttempt((n) => n + 1);
    },
  };
}
