import { INK_2, RULE, RULE_2, type Span, strong } from "./ink";
import type { Line } from "./typeset";
import { LEFT, RIGHT, type Sheet, type Struct } from "./sheet";

export interface Column {
  head: string;
  /** points; the last column may be 0 and takes what is left */
  width: number;
  align?: "right";
}

export interface RowOptions {
  /** points that have to follow on the same page */
  keep?: number;
  /** drawn beside each part of the row; `first` at its beginning */
  beside?: (top: number, bottom: number, first: boolean) => void;
}

const PAD = 3;
const GUTTER = 12;

/** A table whose rows may run over the end of a page; the heads come again there. */
export class Table {
  private readonly element: Struct;
  private readonly at: { x: number; width: number; column: Column }[];
  private readonly heads: Line[][];
  /** the line under the heads is the rule over the first row */
  private fresh = false;

  constructor(private readonly sheet: Sheet, columns: readonly Column[], { x = LEFT, name }: { x?: number; name: string }) {
    let left = x;
    this.at = columns.map((column) => {
      const width = (column.width || RIGHT - left + GUTTER) - GUTTER;
      const place = { x: left, width, column };
      left += width + GUTTER;
      return place;
    });
    this.heads = this.at.map(({ column, width }) => sheet.type.lines([strong(column.head, { size: 8, color: INK_2 })], width));
    this.element = sheet.element("Table", undefined, { title: name });
    sheet.ensure(this.headHeight + 30);
    const row = sheet.element("TR", this.element);
    const top = sheet.y;
    this.heads.forEach((lines, i) => sheet.tagged(sheet.element("TH", row, { scope: "Column" }), "TH", () => this.putHead(lines, i, top)));
    row.end();
    this.underHeads(top);
  }

  private get headHeight(): number {
    return Math.max(...this.heads.map(heightOf)) + 2 * PAD;
  }

  private putHead(lines: readonly Line[], i: number, top: number): void {
    this.sheet.y = top + this.headHeight - PAD - heightOf(lines);
    this.putCell(lines, i);
  }

  private underHeads(top: number): void {
    this.sheet.y = top + this.headHeight;
    this.sheet.rule(RULE_2, 0.9);
    this.fresh = true;
  }

  private putCell(lines: readonly Line[], i: number): void {
    const { x, width, column } = this.at[i];
    for (const line of lines) {
      const used = line.pieces.reduce((sum, { piece }) => sum + piece.width, 0);
      this.sheet.type.draw(line, column.align === "right" ? x + width - used : x, this.sheet.y);
      this.sheet.y += line.height;
    }
  }

  /** The heads of a later page are drawn for the eye alone. */
  private turnPage(): void {
    this.sheet.newPage();
    const top = this.sheet.y;
    this.sheet.artifact(() => this.heads.forEach((lines, i) => this.putHead(lines, i, top)));
    this.underHeads(top);
  }

  row(cells: readonly (readonly Span[])[], { keep = 0, beside }: RowOptions = {}): void {
    const { sheet } = this;
    const laid = cells.map((spans, i) => sheet.type.lines(spans, this.at[i].width, 9));
    const row = sheet.element("TR", this.element);
    const elements = cells.map(() => sheet.element("TD", row));
    const done = laid.map(() => 0);
    // a row stays whole where a page has room for it; a longer one runs on
    const whole = Math.max(...laid.map(heightOf)) + 2 * PAD;
    if (whole + keep > sheet.room && (whole < 180 || sheet.room < 60)) this.turnPage();
    for (let first = true; first || laid.some((lines, i) => done[i] < lines.length); first = false) {
      if (!first) this.turnPage();
      if (first && !this.fresh) sheet.rule(RULE, 0.5);
      this.fresh = false;
      const top = sheet.y;
      let bottom = top;
      sheet.y = top + PAD;
      const from = sheet.y;
      laid.forEach((lines, i) => {
        if (done[i] >= lines.length) return;
        sheet.y = from;
        const some = sheet.fitting(lines, done[i]);
        sheet.tagged(elements[i], "TD", () => this.putCell(some, i));
        done[i] += some.length;
        bottom = Math.max(bottom, sheet.y);
      });
      sheet.y = bottom + PAD;
      if (beside) sheet.artifact(() => beside(top, sheet.y, first));
    }
    row.end();
  }

  /** What belongs to the row above, over the table's full width. */
  below(draw: (cell: Struct) => void): void {
    const row = this.sheet.element("TR", this.element);
    const cell = this.sheet.element("TD", row);
    draw(cell);
    row.end();
  }

  end(): void {
    this.sheet.rule(RULE_2, 0.6);
    this.element.end();
    this.sheet.space(8);
  }
}

function heightOf(lines: readonly Line[]): number {
  return lines.reduce((sum, line) => sum + line.height, 0);
}
