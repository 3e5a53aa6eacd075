import { reduceCells } from "./strip";

/** The image strip as characters, for a page without colours: the classes of strip.ts, 64 to a row. */
const SIGN: Record<string, string> = { b: ".", z: "0", t: "a", o: "o", d: "#", n: "?" };

export const STRIP_LEGEND = ". blank (FF)  0 zeros  a text  o data  # dense  ? not read  ^ differs";

/** One character for each of `width` parts; the most striking class of a part wins. */
export function stripRow(cells: string, width = 64): string {
  return [...reduceCells(cells, width)].map((letter) => SIGN[letter] ?? "?").join("");
}

/** A row under a strip: "^" where a part holds a difference. `cells`: differing bytes in each cell. */
export function markRow(cells: readonly number[], width = 64): string {
  let out = "";
  for (let i = 0; i < width; i += 1) {
    const from = Math.floor((i * cells.length) / width);
    const to = Math.max(from + 1, Math.floor(((i + 1) * cells.length) / width));
    out += cells.slice(from, to).some((n) => n > 0) ? "^" : " ";
  }
  return out.trimEnd();
}
