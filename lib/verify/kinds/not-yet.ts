/**
 * Spellings of the quantities that people may type but that this edition does not verify. They are recognised, so
 * that an author is told so instead of being told that the notation is wrong.
 */
export const NOT_YET: readonly { name: string; begins: RegExp }[] = [
  { name: "6j and 9j symbols", begins: /^\{/u },
  { name: "Racah W coefficients", begins: /^W\s*\(/u },
  { name: "Gaunt integrals", begins: /^G\s*\(/u },
  { name: "Gaunt coefficients c^k", begins: /^c\s*\(/u },
  { name: "reduced matrix elements", begins: /^[<⟨〈][^|‖∥]*(?:\|\s*\||‖|∥)/u },
  { name: "matrix elements of tensor operators", begins: /^[<⟨〈][^|∣]*[|∣]\s*\p{L}+\s*\(/u },
  { name: "coupled states", begins: /^[|∣]/u },
];
