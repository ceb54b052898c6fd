import type { KeyClaim, KeyContent } from "@/lib/keys/key-content";

export type KeyChanges = {
  added: KeyClaim[];
  /** gone since: withdrawn or removed */
  gone: KeyClaim[];
  changed: { before: KeyClaim; after: KeyClaim }[];
  same: number;
  /** the choices of the conventions sheet that differ */
  conventions: string[];
};

/** What a key says that the one before it did not. A claim is followed by its id, so a renamed one is not a new one. */
export function compareKeys(before: KeyContent, after: KeyContent): KeyChanges {
  const old = new Map(before.claims.map((claim) => [claim.id, claim]));
  const kept = new Set(after.claims.map(({ id }) => id));
  const changed = after.claims.flatMap((claim) => {
    const was = old.get(claim.id);
    return was && !isSame(was, claim) ? [{ before: was, after: claim }] : [];
  });
  const added = after.claims.filter(({ id }) => !old.has(id));
  const sheet = (content: KeyContent): Record<string, unknown> => content.conventions;
  return {
    added,
    gone: before.claims.filter(({ id }) => !kept.has(id)),
    changed,
    same: after.claims.length - added.length - changed.length,
    conventions: Object.keys(sheet(after)).filter((name) => sheet(before)[name] !== sheet(after)[name]),
  };
}

const isSame = (a: KeyClaim, b: KeyClaim) =>
  a.ref === b.ref && a.quantity === b.quantity && a.answer.text === b.answer.text;
