/** Version of the exact engine; part of every finding and of every piece of evidence. */
export const ENGINE_VERSION = "surdmark-symbols 1.0.0";
