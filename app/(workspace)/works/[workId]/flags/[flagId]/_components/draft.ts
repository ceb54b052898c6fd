/** Hands words that could no longer be sent with a settling to the box of the discussion. */
const NAME = "surdmark-draft";

export function offerDraft(text: string): void {
  window.dispatchEvent(new CustomEvent<string>(NAME, { detail: text }));
}

/** Calls back with offered words until the returned function is called. */
export function onDraft(take: (text: string) => void): () => void {
  const listen = (event: Event) => take((event as CustomEvent<string>).detail);
  window.addEventListener(NAME, listen);
  return () => window.removeEventListener(NAME, listen);
}
