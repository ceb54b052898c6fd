import type { Quantity } from "@/lib/symbols/quantity";
import type { Conventions } from "../conventions";
import type { Shape } from "../quantity-shape";

/** How one kind of quantity is recognised and read. A new kind is one such object in a file of its own. */
export type KindReader = {
  /** Its name in messages. */
  name: string;
  /** Whether a symbol of this shape is meant to be of this kind (its entries may still be wrong). */
  claims: (shape: Shape) => boolean;
  /** @throws Unreadable with the place of the first entry that does not fit */
  read: (shape: Shape, conventions: Conventions) => Quantity;
};
