import localFont from "next/font/local";

// Each subset is a family of its own so that a page fetches only what it shows; the stacks are chained in globals.css.

export const uiLatin = localFont({
  src: "../node_modules/@fontsource-variable/commissioner/files/commissioner-latin-wght-normal.woff2",
  weight: "100 900",
  variable: "--font-ui",
  adjustFontFallback: false,
});

export const uiLatinExtended = localFont({
  src: "../node_modules/@fontsource-variable/commissioner/files/commissioner-latin-ext-wght-normal.woff2",
  weight: "100 900",
  variable: "--font-ui-extended",
  preload: false,
  adjustFontFallback: false,
  declarations: [
    { prop: "unicode-range", value: "U+0100-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+1D00-1DBF, U+1E00-1E9F" },
  ],
});

export const uiGreek = localFont({
  src: "../node_modules/@fontsource-variable/commissioner/files/commissioner-greek-wght-normal.woff2",
  weight: "100 900",
  variable: "--font-ui-greek",
  preload: false,
  adjustFontFallback: false,
  declarations: [{ prop: "unicode-range", value: "U+370-3FF" }],
});

export const monoLatin = localFont({
  src: "../node_modules/@fontsource-variable/source-code-pro/files/source-code-pro-latin-wght-normal.woff2",
  weight: "200 900",
  variable: "--font-figures",
  adjustFontFallback: false,
});

export const monoGreek = localFont({
  src: "../node_modules/@fontsource-variable/source-code-pro/files/source-code-pro-greek-wght-normal.woff2",
  weight: "200 900",
  variable: "--font-figures-greek",
  preload: false,
  adjustFontFallback: false,
  declarations: [{ prop: "unicode-range", value: "U+370-3FF" }],
});

/** Arrows, relations and operators; last but for the system's own faces, so it is fetched only where a glyph is missing. */
export const mathSigns = localFont({
  src: "../node_modules/@fontsource/noto-sans-math/files/noto-sans-math-latin-400-normal.woff2",
  weight: "400",
  variable: "--font-math",
  preload: false,
  adjustFontFallback: false,
  declarations: [{ prop: "unicode-range", value: "U+2032-2033, U+2070-22FF, U+27C0-27EF, U+2980-2AFF, U+1D400-1D7FF" }],
});

export const fontVariables = [uiLatin, uiLatinExtended, uiGreek, monoLatin, monoGreek, mathSigns]
  .map((font) => font.variable)
  .join(" ");
