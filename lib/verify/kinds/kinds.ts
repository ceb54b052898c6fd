import { clebschGordan } from "./clebsch-gordan";
import type { KindReader } from "./kind-reader";
import { threeJ } from "./three-j";

/** The kinds of quantity that are read and verified, in the order in which they are asked. */
export const KINDS: readonly KindReader[] = [threeJ, clebschGordan];

/** "3j symbols such as … and …", for messages. */
export const VERIFIED_HERE = "3j symbols (1 1 2; 0 0 0) and Clebsch-Gordan coefficients <1 0 1 0 | 2 0>";
