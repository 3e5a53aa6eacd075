import PDFDocument from "pdfkit";
import { BARE_EDGE, code, COPPER, INK, INK_2, INK_3, MASK, plain, quiet, RULE, RULE_2, type Span, strong } from "./ink";
import { drawMark, type MarkKind } from "./marks";
import { type Line, Typesetter } from "./typeset";

export type Doc = PDFKit.PDFDocument;
export type Struct = PDFKit.PDFStructureElement;

/** pdfkit writes a table head's scope; its types do not know of it yet. */
type ElementOptions = PDFKit.Mixins.StructureElementOptions & { scope?: "Column" };

export const LEFT = 48;
export const RIGHT = 547.28;
export const WIDTH = RIGHT - LEFT;
/** the margin that carries labels and the names beside strips */
export const MARGIN = 92;
const TOP = 72;
const BOTTOM = 782;
/** how long other requests wait at most for a block to end, in ms and a little more */
const TURN = 10;

export interface SheetHead {
  title: string;
  workshop: string;
  ref: string;
  madeAt: Date;
  /** what the document is, as its title says it; "Report of the case bundle" when left out */
  name?: string;
  /** short form of the logs' heads, on every page */
  foot: string;
}

/** Pages of A4 with a place to write on. What is written is tagged, so that a screen reader has it in order. */
export class Sheet {
  readonly doc: Doc;
  readonly type: Typesetter;
  y = TOP;
  private readonly root: Struct;
  private section: Struct;
  private readonly outline: PDFKit.PDFOutline[];
  private since = performance.now();
  /** where the last chapter's heading ended: a part that begins there needs no rule of its own */
  private underChapter = -1;

  constructor(private readonly head: SheetHead) {
    const info = { Title: head.title, Author: head.workshop, Subject: `Case ${head.ref}`, Creator: "Twinread", Producer: "Twinread", CreationDate: head.madeAt, ModDate: head.madeAt };
    // no font at first: pdfkit would load one that is not embedded
    this.doc = new PDFDocument({ size: "A4", margin: 0, bufferPages: true, autoFirstPage: false, pdfVersion: "1.7", lang: "en", tagged: true, displayTitle: true, info, font: "" });
    this.type = new Typesetter(this.doc);
    this.doc.addPage();
    this.root = this.doc.struct("Document");
    this.doc.addStructure(this.root);
    this.section = this.root;
    this.outline = [this.doc.outline];
  }

  /** Lets other work have the thread; called between blocks. */
  async breathe(): Promise<void> {
    if (performance.now() - this.since < TURN) return;
    await new Promise<void>((done) => setImmediate(done));
    this.since = performance.now();
  }

  get room(): number {
    return BOTTOM - this.y;
  }

  /** True when a new page was begun. */
  ensure(height: number): boolean {
    if (height <= this.room || this.y === TOP) return false;
    this.newPage();
    return true;
  }

  newPage(): void {
    this.doc.addPage();
    this.y = TOP;
  }

  space(height: number): void {
    if (this.y > TOP) this.y = Math.min(BOTTOM, this.y + height);
  }

  element(type: string, parent: Struct = this.section, options: ElementOptions = {}): Struct {
    const made = this.doc.struct(type, options);
    parent.add(made);
    return made;
  }

  /** Draws as the content of a structure element; never over the end of a page. */
  tagged(element: Struct, type: string, draw: () => void): void {
    const content = this.doc.markStructureContent(type);
    draw();
    this.doc.endMarkedContent();
    element.add(content);
  }

  artifact(draw: () => void): void {
    this.doc.markContent("Artifact", { type: "Layout" });
    draw();
    this.doc.endMarkedContent();
  }

  rule(color = RULE, width = 0.75): void {
    this.artifact(() => this.doc.moveTo(LEFT, this.y).lineTo(RIGHT, this.y).lineWidth(width).stroke(color));
  }

  /** A chapter (1), a part (2) or a heading inside a part (3); the first two are bookmarks. */
  heading(level: 1 | 2 | 3, text: string, { number = "", keep = 60, plate }: { number?: string; keep?: number; plate?: (x: number, y: number) => number } = {}): void {
    const size = [0, 15, 11.5, 9.5][level];
    const spans = [...(number ? [strong(`${number}  `, { size, color: COPPER })] : []), strong(text, { size })];
    const directly = level === 2 && this.y === this.underChapter;
    this.space(directly ? 0 : [0, 20, 16, 10][level]);
    const lines = this.type.lines(spans, WIDTH - (plate ? 90 : 0));
    this.ensure(lines.reduce((sum, line) => sum + line.height, 0) + keep);
    if (level < 3) {
      if (level === 1) this.section = this.element("Sect", this.root);
      if (!directly) {
        this.rule(level === 1 ? RULE_2 : RULE, level === 1 ? 1.2 : 0.75);
        this.y += level === 1 ? 8 : 6;
      }
      const parent = this.outline[level - 1];
      this.outline[level] = parent.addItem(number ? `${number} ${text}` : text, { expanded: level === 1 });
      this.outline.length = level + 1;
    }
    let x = LEFT;
    if (plate) this.artifact(() => (x += plate(LEFT, this.y) + 8));
    // the report's title is the first of the headings
    const tag = `H${level + 1}`;
    const element = this.element(tag);
    this.tagged(element, tag, () => this.put(lines, x));
    element.end();
    this.y += [0, 6, 4, 3][level];
    if (level === 1) this.underChapter = this.y;
  }

  /** Draws lines that fit at the place where the sheet is. */
  put(lines: readonly Line[], x: number): void {
    for (const line of lines) {
      this.type.draw(line, x, this.y);
      this.y += line.height;
    }
  }

  /** Text over as many pages as it needs. */
  paragraph(spans: readonly Span[], { x = LEFT, width = RIGHT - x, gap = 5, mark, element, type = "P" }: { x?: number; width?: number; gap?: number; mark?: MarkKind | "dash"; element?: Struct; type?: string } = {}): void {
    const indent = mark ? 13 : 0;
    const lines = this.type.lines(spans, width - indent);
    const own = element ?? this.element(type);
    for (let at = 0; at < lines.length; ) {
      this.ensure(Math.min(2, lines.length - at) * lines[at].height);
      const some = this.fitting(lines, at);
      if (at === 0 && mark) {
        const [top, size] = [this.y + lines[0].height / 2 - 3.6, 7.2];
        this.artifact(() => (mark === "dash" ? this.doc.rect(x + 1, top + size / 2, 6, 0.8).fill(INK_2) : drawMark(this.doc, mark, x, top, size)));
      }
      this.tagged(own, type, () => this.put(some, x + indent));
      at += some.length;
    }
    if (!element) own.end();
    this.space(gap);
  }

  /** The lines from `at` on that this page still takes; at least one. */
  fitting(lines: readonly Line[], at: number): Line[] {
    const some: Line[] = [];
    let height = 0;
    for (const line of lines.slice(at)) {
      if (some.length > 0 && height + line.height > this.room) break;
      some.push(line);
      height += line.height;
    }
    return some;
  }

  /** Labels in the margin, values beside them; what has no value is left out. */
  facts(rows: readonly (readonly [label: string, value: readonly Span[] | null])[], { x = LEFT, margin = MARGIN } = {}): void {
    const list = this.element("L");
    for (const [label, value] of rows) {
      if (!value || value.length === 0) continue;
      const names = this.type.lines([quiet(label)], margin - 8);
      const lines = this.type.lines(value, RIGHT - x - margin);
      const item = this.element("LI", list);
      this.ensure(Math.max(names.reduce((sum, line) => sum + line.height, 0), lines[0].height));
      const top = this.y;
      const term = this.element("Lbl", item);
      this.tagged(term, "Lbl", () => this.put(names, x));
      const below = this.y;
      this.y = top;
      const body = this.element("LBody", item);
      for (let at = 0; at < lines.length; ) {
        if (at > 0) this.newPage();
        const some = this.fitting(lines, at);
        this.tagged(body, "LBody", () => this.put(some, x + margin));
        at += some.length;
        if (at >= lines.length && at === some.length) this.y = Math.max(this.y, below);
      }
      this.y += 1.5;
    }
    list.end();
    this.space(5);
  }

  /** The opening of the first page: the edge of a board, whose report, of what. */
  opening(rows: readonly (readonly [string, Span])[]): void {
    this.artifact(() => {
      this.doc.rect(0, 0, 595.28, 18).fill(MASK);
      this.doc.rect(0, 18, 595.28, 3).fill(BARE_EDGE);
    });
    this.y = 46;
    this.paragraph([strong(this.head.workshop, { size: 10.5, color: COPPER })], { gap: 1 });
    const title = this.element("H1");
    const lines = this.type.lines([strong(this.head.name ?? "Report of the case bundle", { size: 22 })], WIDTH);
    this.tagged(title, "H1", () => this.put(lines, LEFT));
    title.end();
    this.y += 4;
    this.facts(rows.map(([label, span]) => [label, [span]]));
    this.artifact(() => {
      for (const dy of [0, 2.2]) this.doc.moveTo(LEFT, this.y + dy).lineTo(RIGHT, this.y + dy).lineWidth(0.8).stroke(RULE_2);
    });
    this.y += 10;
  }

  /** Head and foot on every page, then the bytes. */
  async finish(): Promise<Buffer> {
    this.root.end();
    const { start, count } = this.doc.bufferedPageRange();
    for (let i = start; i < start + count; i += 1) {
      this.doc.switchToPage(i);
      this.doc.markContent("Artifact", { type: "Pagination" });
      if (i > start) this.side(34, [strong(this.head.workshop, { size: 8, color: COPPER })], [quiet("Case ", { size: 8 }), code(this.head.ref, { size: 8 }), quiet(`, ${(this.head.name ?? "Report of the case bundle").replace(/^./, (first) => first.toLowerCase())}`, { size: 8 })], 50);
      this.side(800, [plain(this.head.foot, { face: "mono", size: 7.5, color: INK_3 })], [plain(`Page ${i - start + 1} of ${count}`, { size: 8, color: INK })], 796);
      this.doc.endMarkedContent();
      await this.breathe();
    }
    const chunks: Buffer[] = [];
    const done = new Promise<Buffer>((resolve, reject) => {
      this.doc.on("data", (chunk: Buffer) => chunks.push(chunk));
      this.doc.once("end", () => resolve(Buffer.concat(chunks)));
      this.doc.once("error", reject);
    });
    this.doc.end();
    return done;
  }

  /** One line from each side over or under a rule. */
  private side(y: number, left: Span[], right: Span[], ruleAt: number): void {
    this.doc.moveTo(LEFT, ruleAt).lineTo(RIGHT, ruleAt).lineWidth(0.6).stroke(RULE_2);
    const width = right.reduce((sum, span) => sum + this.type.width(span), 0);
    this.type.lines(left, WIDTH - width - 16).slice(0, 2).forEach((line, i) => this.type.draw(line, LEFT, y + i * line.height));
    this.type.lines(right, width + 1).forEach((line) => this.type.draw(line, RIGHT - width, y));
  }
}
