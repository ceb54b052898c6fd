"use client";

/**
 * What was typed and not saved, kept in this tab until it is saved or given up: a failed save, a closed form or a
 * reload loses nothing. It never leaves the browser.
 */
export function readDraft<T extends object>(key: string): Partial<T> | null {
  try {
    const kept = sessionStorage.getItem(`draft:${key}`);
    return kept === null ? null : (JSON.parse(kept) as Partial<T>);
  } catch {
    return null;
  }
}

export function keepDraft(key: string, values: object): void {
  try {
    sessionStorage.setItem(`draft:${key}`, JSON.stringify(values));
  } catch {
    // A full or forbidden store: the text still stands in the form.
  }
}

export function dropDraft(key: string): void {
  try {
    sessionStorage.removeItem(`draft:${key}`);
  } catch {
    // There was nothing to drop.
  }
}
