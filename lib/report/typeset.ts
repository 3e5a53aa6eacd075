import type PDFDocument from "pdfkit";
import { fontFiles, runsOf } from "./faces";
import { INK_3, type Span } from "./ink";

export interface Piece {
  text: string;
  font: string;
  size: number;
  color: string;
  width: number;
  /** a code in place of a character: lines may break at its sides */
  escaped?: true;
}

export interface Line {
  pieces: { piece: Piece; x: number }[];
  height: number;
}

const LEADING = 1.36;
const KEPT = 20_000;
/** Figures of one width, as on screen. */
const TABULAR: PDFKit.Mixins.OpenTypeFeatures[] = ["tnum"];
const NONE: PDFKit.Mixins.OpenTypeFeatures[] = [];

/** What pdfkit is asked for without features it keeps word by word: good for words, not for digests that never come again. */
function featuresOf(text: string, font: string): PDFKit.Mixins.OpenTypeFeatures[] | undefined {
  if (font.includes("-mono-")) return NONE;
  return /\d/.test(text) ? TABULAR : undefined;
}

/** pdfkit's own view of an open font: the only way to ask which characters it has. */
interface OpenFont {
  _font: { font: { hasGlyphForCodePoint(codePoint: number): boolean } };
}

/** Breaks spans into lines. A word longer than a line goes on in the next one; nothing is cut. */
export class Typesetter {
  private readonly widths = new Map<string, number>();
  private readonly known = new Map<string, boolean>();

  constructor(private readonly doc: typeof PDFDocument.prototype) {
    for (const [name, file] of fontFiles()) doc.registerFont(name, file);
  }

  private has = (font: string, codePoint: number): boolean => {
    const key = `${font}:${codePoint}`;
    const known = this.known.get(key);
    if (known !== undefined) return known;
    this.doc.font(font);
    const has = (this.doc as unknown as OpenFont)._font.font.hasGlyphForCodePoint(codePoint);
    this.known.set(key, has);
    return has;
  };

  /** Points at a size of 1. */
  private unitWidth(text: string, font: string): number {
    const key = `${font}:${text}`;
    const known = this.widths.get(key);
    if (known !== undefined) return known;
    const width = this.doc.font(font).fontSize(1).widthOfString(text, { features: featuresOf(text, font) });
    if (this.widths.size > KEPT) this.widths.clear();
    this.widths.set(key, width);
    return width;
  }

  width(span: Span): number {
    return this.pieces(span.text, span).reduce((sum, piece) => sum + piece.width, 0);
  }

  private pieces(text: string, span: Span): Piece[] {
    return runsOf(text, span, this.has).map(({ text: part, font, escaped }) => {
      const size = escaped ? span.size * 0.85 : span.size;
      return { text: part, font, size, color: escaped ? INK_3 : span.color, width: this.unitWidth(part, font) * size, ...(escaped ? { escaped } : {}) };
    });
  }

  /** `leastSize`: lines are at least as high as for this size, so that cells side by side stand on one line. */
  lines(spans: readonly Span[], width: number, leastSize = 6): Line[] {
    const lines: Line[] = [];
    const least = Math.max(leastSize, ...spans.map((span) => span.size)) * LEADING;
    let line: Piece[] = [];
    let word: Piece[] = [];
    let space: Piece | null = null;
    const wide = (pieces: Piece[]) => pieces.reduce((sum, piece) => sum + piece.width, 0);
    const close = () => {
      lines.push(placed(line, least));
      line = [];
      space = null;
    };
    const settle = () => {
      if (word.length === 0) return;
      const gap = line.length > 0 ? space : null;
      if (wide(line) + (gap?.width ?? 0) + wide(word) <= width) line.push(...(gap ? [gap] : []), ...word);
      else {
        if (line.length > 0) close();
        word = this.broken(word, width, (full) => {
          line = full;
          close();
        });
        line = word;
      }
      word = [];
      space = null;
    };
    for (const span of spans) {
      for (const [token] of span.text.replace(/\r\n?/g, "\n").replace(/[\t\u00a0]/g, " ").matchAll(/\n| +|[^\n ]+/g)) {
        if (token === "\n") {
          settle();
          close();
        } else if (token.startsWith(" ")) {
          settle();
          space = this.pieces(" ", span)[0];
        } else {
          for (const piece of this.pieces(token, span)) {
            if (piece.escaped) settle();
            word.push(piece);
            if (piece.escaped) settle();
          }
        }
      }
    }
    settle();
    if (line.length > 0 || lines.length === 0) close();
    return lines;
  }

  /** Takes full lines off a word that is too long for one; gives back the rest. */
  private broken(word: Piece[], width: number, full: (line: Piece[]) => void): Piece[] {
    if (word.reduce((sum, piece) => sum + piece.width, 0) <= width) return word;
    let line: Piece[] = [];
    let used = 0;
    for (const piece of word) {
      let part = "";
      let partWidth = 0;
      const keep = () => {
        if (part) line.push({ ...piece, text: part, width: partWidth });
      };
      for (const character of piece.text) {
        const step = this.unitWidth(character, piece.font) * piece.size;
        if (used + partWidth + step > width && (part || line.length > 0)) {
          keep();
          full(line);
          [line, used, part, partWidth] = [[], 0, "", 0];
        }
        part += character;
        partWidth += step;
      }
      keep();
      used += partWidth;
    }
    return line;
  }

  /** Draws a line; `y` is its upper edge. Neighbours of one look go out as one text, so that words stay whole for a reader. */
  draw(line: Line, x: number, y: number): void {
    const baseline = y + line.height * 0.73;
    for (const { piece, x: at } of line.pieces) {
      this.doc.font(piece.font).fontSize(piece.size).fillColor(piece.color).text(piece.text, x + at, baseline, { lineBreak: false, baseline: "alphabetic", features: featuresOf(piece.text, piece.font) });
    }
  }
}

function placed(pieces: Piece[], least: number): Line {
  const out: Line["pieces"] = [];
  let x = 0;
  for (const piece of pieces) {
    const last = out.at(-1)?.piece;
    if (last && last.font === piece.font && last.size === piece.size && last.color === piece.color) {
      last.text += piece.text;
      last.width += piece.width;
    } else out.push({ piece: { ...piece }, x });
    x += piece.width;
  }
  return { pieces: out, height: Math.max(least, ...pieces.map((piece) => piece.size * LEADING)) };
}
