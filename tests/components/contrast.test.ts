import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";

/**
 * Contrast of every pair of tokens that the screens put on each other, by the formula of WCAG 2.2 ("relative luminance",
 * "contrast ratio"): 4.5 for text (success criterion 1.4.3), 3 for what has to be seen but isn't text (1.4.11).
 */
const source = readFileSync(new URL("../../components/ui/tokens.css", import.meta.url), "utf8");

function tokensAfter(opening: string): Record<string, string> {
  const from = source.indexOf(opening);
  if (from < 0) throw new Error(`tokens.css has no ${opening}`);
  const block = source.slice(from, source.indexOf("}", from));
  return Object.fromEntries([...block.matchAll(/--([a-z0-9-]+): (#[0-9A-Fa-f]{3,6})\b/g)].map(([, name, value]) => [name, value]));
}

const day = tokensAfter(":root {");
const THEMES = {
  day,
  "night by choice": { ...day, ...tokensAfter(':root[data-theme="night"] {') },
  "night by the system": { ...day, ...tokensAfter(':root:not([data-theme="day"])') },
  print: { ...day, ...tokensAfter("@media print {") },
};

function luminance(hex: string): number {
  const full = hex.length === 4 ? [...hex.slice(1)].map((digit) => digit + digit).join("") : hex.slice(1);
  const [r, g, b] = [0, 2, 4].map((at) => {
    const channel = parseInt(full.slice(at, at + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(one: string, other: string): number {
  const [light, dark] = [luminance(one), luminance(other)].sort((a, b) => b - a);
  return (light + 0.05) / (dark + 0.05);
}

const on = (grounds: readonly string[], ...tokens: string[]) => tokens.flatMap((token) => grounds.map((ground): [string, string] => [token, ground]));
const PAGE = ["paper", "sheet", "well"];
const BOARD = ["mask", "mask-deep"];
const WASHES = ["green-wash", "block-wash", "caution-wash", "note-wash"];

const TEXT = [
  ...on(PAGE, "ink", "ink-2", "ink-3", "green", "copper", "block", "caution", "note"), ...on(WASHES, "ink", "ink-2"),
  ...WASHES.map((wash): [string, string] => [wash.replace("-wash", ""), wash]), ...on(BOARD, "silk", "silk-2", "block-on-mask", "caution-on-mask", "note-on-mask"),
  ...on(["act-bg", "act-hover"], "act-ink"), ...on(["stop-bg"], "stop-ink"), ...on(["cell-diff"], "paper"),
];
const SEEN = [
  ...on(["paper", "sheet"], "rule-2", "copper-2"), ...on(PAGE, "focus"), ...on(BOARD, "pad"), ...on(["sheet"], "cell-ff", "cell-00", "cell-text", "cell-data", "cell-dense", "cell-diff"),
];
/** On paper a strip's classes are told apart by height and pattern too; ordinary data is a light grey there, so that a difference stands out. */
const LIGHTER_IN_PRINT = ["cell-data"];

it("is computed as WCAG defines it: black on white is 21, a colour on itself 1, #777 on white just under 4.5", () => {
  expect([contrast("#000000", "#FFFFFF"), contrast("#0E4A38", "#0E4A38")]).toEqual([21, 1]);
  expect(contrast("#777777", "#FFFFFF")).toBeCloseTo(4.48, 2);
});

it("is the same by night whoever asks for the night", () => {
  expect(THEMES["night by choice"]).toEqual(THEMES["night by the system"]);
});

describe.each(Object.entries(THEMES))("%s", (name, tokens: Record<string, string>) => {
  const ratios = (pairs: readonly [string, string][]) => pairs.map(([token, ground]) => ({ pair: `${token} on ${ground}`, ratio: Math.round(contrast(tokens[token], tokens[ground]) * 100) / 100, token }));

  it("has no text under 4.5", () => {
    expect(ratios(TEXT).filter(({ ratio }) => !(ratio >= 4.5))).toEqual([]);
  });

  it("has no border of a control, mark or cell under 3", () => {
    const lighter = name === "print" ? LIGHTER_IN_PRINT : [];
    expect(ratios(SEEN).filter(({ ratio, token }) => !(ratio >= 3) && !lighter.includes(token))).toEqual([]);
  });
});
