import { readFileSync } from "node:fs";
import path from "node:path";
import type { Style } from "./ink";
import { sfntOf } from "./woff";

/** A face of the type family in two parts: what the Latin file lacks stands in the second. */
export interface Face {
  latin: string;
  extended: string;
}

const WEIGHT = { regular: 400, bold: 700 } as const;
const FAMILIES = ["next", "mono"] as const;

const named = (family: string, part: string, weight: number) => `atkinson-hyperlegible-${family}-${part}-${weight}-normal`;

export function faceOf({ face, bold }: Pick<Style, "face" | "bold">): Face {
  const weight = bold ? WEIGHT.bold : WEIGHT.regular;
  return { latin: named(face, "latin", weight), extended: named(face, "latin-ext", weight) };
}

let loaded: Map<string, Buffer> | null = null;

/** The font files of the installed packages by name (SIL OFL 1.1), read once. */
export function fontFiles(): Map<string, Buffer> {
  if (loaded) return loaded;
  loaded = new Map();
  for (const family of FAMILIES) {
    const folder = path.join(/* turbopackIgnore: true */ process.cwd(), "node_modules/@fontsource", `atkinson-hyperlegible-${family}`, "files");
    for (const part of ["latin", "latin-ext"]) {
      for (const weight of Object.values(WEIGHT)) {
        const name = named(family, part, weight);
        loaded.set(name, sfntOf(readFileSync(path.join(folder, `${name}.woff`))));
      }
    }
  }
  return loaded;
}

export interface Run {
  text: string;
  font: string;
  /** it stands for a character that no face can show */
  escaped: boolean;
}

/** Formats, controls, line and paragraph marks, private and unassigned characters: nobody would see them. */
const UNSEEN = /[\p{C}\p{Zl}\p{Zp}]/u;
/** Spaces other than the plain one look like it and are not it. */
const OTHER_SPACE = /(?! )\p{Zs}/u;

/** U+05D0; six digits beyond the first plane. */
export function codePointText(character: string): string {
  return `U+${(character.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, "0")}`;
}

/** Stretches of one font each. A character that no face can show becomes its code, so that nothing vanishes. */
export function runsOf(text: string, style: Pick<Style, "face" | "bold">, has: (font: string, codePoint: number) => boolean): Run[] {
  const { latin, extended } = faceOf(style);
  const escapes = faceOf({ face: "mono", bold: style.bold }).latin;
  const runs: Run[] = [];
  for (const character of text) {
    const codePoint = character.codePointAt(0) ?? 0;
    const seen = !UNSEEN.test(character) && !OTHER_SPACE.test(character);
    const font = !seen ? null : has(latin, codePoint) ? latin : has(extended, codePoint) ? extended : null;
    const last = runs.at(-1);
    const [piece, face, escaped] = font ? [character, font, false] : [codePointText(character), escapes, true];
    if (last && last.font === face && !escaped && !last.escaped) last.text += piece;
    else runs.push({ text: piece, font: face, escaped });
  }
  return runs;
}
