import localFont from "next/font/local";

// The latin subsets only, preloaded. Every other character falls through to the faces that app/layout.tsx
// imports with their unicode ranges, so Greek or accented letters cost a download only where they occur.

/** The serif of the work: headings, statements, values in running text. */
export const workFace = localFont({
  src: [
    {
      path: "../node_modules/@fontsource/stix-two-text/files/stix-two-text-latin-400-normal.woff2",
      weight: "400",
      style: "normal",
    },
    {
      path: "../node_modules/@fontsource/stix-two-text/files/stix-two-text-latin-400-italic.woff2",
      weight: "400",
      style: "italic",
    },
    {
      path: "../node_modules/@fontsource/stix-two-text/files/stix-two-text-latin-600-normal.woff2",
      weight: "600",
      style: "normal",
    },
  ],
  variable: "--face-work",
  display: "swap",
  adjustFontFallback: false,
  declarations: [
    {
      prop: "unicode-range",
      value:
        "U+0000-00FF, U+0131, U+0152-0153, U+02BB-02BC, U+02C6, U+02DA, U+02DC, U+2000-206F, U+20AC, U+2122, U+2191, U+2193, U+2212, U+2215",
    },
  ],
});

/** The sans of the controls: labels, buttons, tables. */
export const uiFace = localFont({
  src: "../node_modules/@fontsource-variable/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-wght-normal.woff2",
  weight: "200 800",
  variable: "--face-ui",
  display: "swap",
  adjustFontFallback: false,
  declarations: [
    {
      prop: "unicode-range",
      value:
        "U+0000-00FF, U+0131, U+0152-0153, U+02BB-02BC, U+02C6, U+02DA, U+02DC, U+2000-206F, U+20AC, U+2122, U+2191, U+2193, U+2212, U+2215",
    },
  ],
});
