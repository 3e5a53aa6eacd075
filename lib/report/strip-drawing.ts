import { countOf, sizeText } from "@/lib/core/quantity";
import { address, CELLS, reduceCells } from "@/lib/core/strip";
import { lanePaths, stripPaths } from "@/lib/core/strip-path";
import { CELL, code, DIFF, GREEN, INK_2, plain, quiet, RULE, RULE_2, strong } from "./ink";
import type { ReportDrawing } from "./report-facts";
import { LEFT, MARGIN, RIGHT, type Sheet } from "./sheet";
import { laneKey, type Stack, type StackRow } from "./stacks";

const X = LEFT + MARGIN;
const CELL_WIDTH = (RIGHT - X) / CELLS;
const STRIP = 20;
const LANE = 10;
const RULER = 17;

/** An image's own cells spread over a longer window: what lies past its end is not read, what is longer is joined. */
export function cellsOver(cells: string, imageBytes: number, windowBytes: number): string {
  if (imageBytes >= windowBytes || cells.length === 0) return cells;
  let out = "";
  for (let i = 0; i < CELLS; i += 1) {
    const [from, to] = [(i * windowBytes) / CELLS, ((i + 1) * windowBytes) / CELLS];
    // a cell of which less than half is there is "not read"
    if (imageBytes - from < (to - from) / 2) out += "n";
    else {
      const first = Math.floor((from / imageBytes) * CELLS);
      const last = Math.min(CELLS, Math.max(first + 1, Math.round((Math.min(to, imageBytes) / imageBytes) * CELLS)));
      out += reduceCells(cells.slice(first, last), 1);
    }
  }
  return out;
}

interface Lane {
  words: string;
  /** null: equal all over; undefined: never compared */
  cells: number[] | null | undefined;
}

function laneOf(a: StackRow, b: StackRow, lanes: ReportDrawing["lanes"]): Lane {
  if (a.sha256 === b.sha256) return { words: "equal", cells: null };
  const known = lanes[laneKey(a, b)];
  if (!known) return { words: "differ", cells: undefined };
  return { words: `${countOf(known.differingBytes, "byte")} differ${known.differingBytes === 1 ? "s" : ""}`, cells: known.cells };
}

function ruler(sheet: Sheet, sizeBytes: number): void {
  const { doc } = sheet;
  const top = sheet.y;
  for (let part = 0; part < 4; part += 1) {
    const x = X + part * 64 * CELL_WIDTH;
    doc.moveTo(x, top + 2).lineTo(x, top + RULER - 2).lineWidth(0.6).stroke(RULE_2);
    const [line] = sheet.type.lines([code(address(Math.floor((sizeBytes * part) / 4), sizeBytes), { size: 7.5, color: INK_2 })], 96);
    sheet.type.draw(line, x + 3, top + 2);
  }
  doc.moveTo(X, top + RULER - 2).lineTo(RIGHT, top + RULER - 2).lineWidth(0.6).stroke(RULE_2);
  sheet.y = top + RULER;
}

function strip(sheet: Sheet, cells: string | undefined, y: number, height = STRIP): void {
  const { doc } = sheet;
  doc.moveTo(X, y + height).lineTo(RIGHT, y + height).lineWidth(0.5).stroke(RULE);
  doc.save().translate(X, y);
  for (const path of stripPaths(cells ?? "n".repeat(CELLS), { width: CELL_WIDTH, height })) doc.path(path.d).fill(CELL[path.cls]);
  doc.restore();
}

function lane(sheet: Sheet, { cells }: Lane, y: number): void {
  const { doc } = sheet;
  doc.save().translate(X, y);
  if (cells === undefined) doc.moveTo(0, LANE / 2).lineTo(RIGHT - X, LANE / 2).dash(2, { space: 2 }).lineWidth(0.6).stroke(RULE_2).undash();
  else {
    const { equal, differ } = lanePaths(cells, CELLS, { width: CELL_WIDTH, height: LANE });
    if (equal) doc.path(equal).fill(GREEN);
    if (differ) doc.path(differ).fill(DIFF);
  }
  doc.restore();
}

/** The strips of a stack with the lanes between them, over as many pages as they need. */
export async function drawStack(sheet: Sheet, { title, rows }: Stack, chipBytes: number, { strips, lanes }: ReportDrawing, titled: boolean): Promise<void> {
  const sizeBytes = Math.max(chipBytes, ...rows.map((row) => row.sizeBytes));
  const between = rows.slice(1).map((row, i) => laneOf(rows[i], row, lanes));
  sheet.ensure(16 + RULER + 2 * (STRIP + LANE + 8));
  sheet.paragraph([...(titled ? [strong(`${title}. `)] : []), quiet(`Image strips, 256 cells over ${sizeText(sizeBytes)}`, { size: 8 })], { gap: 2 });
  const figure = sheet.element("Figure", undefined, { alt: [`${title}: ${countOf(rows.length, "image strip")} of 256 cells each.`, ...between.map((one, i) => `${rows[i].name} and ${rows[i + 1].name}: ${one.words}.`)].join(" ") });
  sheet.tagged(figure, "Figure", () => ruler(sheet, sizeBytes));
  for (const [i, row] of rows.entries()) {
    const before = i === 0 ? undefined : between[i - 1];
    const height = STRIP + 5 + (before ? LANE + 6 : 0);
    if (sheet.ensure(height)) sheet.tagged(figure, "Figure", () => ruler(sheet, sizeBytes));
    sheet.tagged(figure, "Figure", () => {
      let y = sheet.y + 3;
      if (before) {
        lane(sheet, before, y);
        const [words] = sheet.type.lines([plain(before.words, { size: 7.5, bold: before.cells !== null, color: before.cells === null ? GREEN : DIFF })], MARGIN);
        sheet.type.draw(words, LEFT, y);
        y += LANE + 6;
      }
      const cells = strips[row.sha256];
      strip(sheet, cells && cellsOver(cells, row.sizeBytes, sizeBytes), y);
      const [name] = sheet.type.lines([strong(row.name, { size: 8.5 })], MARGIN - 6);
      const [note] = sheet.type.lines([quiet(row.note, { size: 7.5 })], MARGIN - 6);
      sheet.type.draw(name, LEFT, y - 1);
      sheet.type.draw(note, LEFT, y + 9.5);
      sheet.y = y + STRIP + 2;
    });
    await sheet.breathe();
  }
  figure.end();
  sheet.space(10);
}

const LOW = 15;

/** One image as a low strip, and below it the same again where it was read back equal; without a ruler. */
export function drawEqual(sheet: Sheet, cells: string, above: string, below: string | null): void {
  const { doc } = sheet;
  sheet.ensure(below ? 2 * LOW + LANE + 8 : LOW + 6);
  const figure = sheet.element("Figure", undefined, { alt: below ? `Two image strips of 256 cells: ${above}; ${below}. They are equal all over.` : `Image strip of 256 cells: ${above}.` });
  sheet.tagged(figure, "Figure", () => {
    const named = (text: string, y: number) => sheet.type.draw(sheet.type.lines([plain(text, { size: 8 })], MARGIN - 4)[0], LEFT, y + 2);
    const top = sheet.y + 1;
    named(above, top);
    strip(sheet, cells, top, LOW);
    sheet.y = top + LOW + 4;
    if (!below) return;
    lane(sheet, { words: "equal", cells: null }, top + LOW + 1);
    const [words] = sheet.type.lines([plain("equal", { size: 7.5, color: GREEN })], MARGIN);
    sheet.type.draw(words, LEFT, top + LOW + 1);
    doc.fillColor(INK_2);
    named(below, top + LOW + LANE + 2);
    strip(sheet, cells, top + LOW + LANE + 2, LOW);
    sheet.y = top + 2 * LOW + LANE + 6;
  });
  figure.end();
}

const LEGEND = [["d", "dense, packed"], ["o", "ordinary data"], ["t", "text-like"], ["z", "zeros (00)"], ["b", "blank (FF)"], ["n", "not read"]] as const;

/** What the cells and lanes mean, in one line. */
export function drawLegend(sheet: Sheet): void {
  sheet.ensure(20);
  const figure = sheet.element("Figure", undefined, { alt: `Legend of the strips: ${LEGEND.map(([, word]) => word).join(", ")}; ticks between strips where bytes differ.` });
  sheet.tagged(figure, "Figure", () => {
    let x = LEFT;
    for (const [letter, word] of LEGEND) {
      sheet.doc.save().translate(x, sheet.y + 1);
      for (const path of stripPaths(letter.repeat(6), { width: 2.6, height: 10 })) sheet.doc.path(path.d).fill(CELL[path.cls]);
      sheet.doc.restore();
      const [line] = sheet.type.lines([quiet(word, { size: 7.5 })], 80);
      sheet.type.draw(line, x + 20, sheet.y + 0.5);
      x += 26 + line.pieces.reduce((sum, { piece }) => sum + piece.width, 0) + 8;
    }
    sheet.doc.save().translate(x, sheet.y + 1);
    const { equal, differ } = lanePaths([0, 0, 8, 64, 200, 0], 6, { width: 2.6, height: 10 });
    sheet.doc.path(equal).fill(GREEN);
    sheet.doc.path(differ).fill(DIFF);
    sheet.doc.restore();
    sheet.type.draw(sheet.type.lines([quiet("bytes differ", { size: 7.5 })], 80)[0], x + 20, sheet.y + 0.5);
  });
  figure.end();
  sheet.y += 18;
}
