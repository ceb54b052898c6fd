"use client";

import { useState } from "react";

import { applyTheme, type Theme } from "@/components/theme";

const CHOICES: readonly { value: Theme; label: string }[] = [
  { value: "light", label: "light" },
  { value: "dark", label: "dark" },
  { value: "system", label: "as the system" },
];

/** Light, dark, or as the system has it. The choice is kept in a cookie, so the server paints it from the first byte. */
export function ThemeSwitch({ theme }: { theme: Theme }) {
  const [chosen, setChosen] = useState(theme);
  function choose(next: Theme) {
    setChosen(next);
    applyTheme(next);
  }
  return (
    <fieldset className="flex flex-wrap items-center gap-x-4 font-ui text-sm">
      <legend className="sr-only">Paper</legend>
      <span aria-hidden="true" className="text-quiet">
        Paper
      </span>
      {CHOICES.map((choice) => (
        <label key={choice.value} className="flex min-h-8 items-center gap-1.5">
          <input
            type="radio"
            name="theme"
            value={choice.value}
            checked={chosen === choice.value}
            onChange={() => choose(choice.value)}
            className="size-4"
          />
          {choice.label}
        </label>
      ))}
    </fieldset>
  );
}
