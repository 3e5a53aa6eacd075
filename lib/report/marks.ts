import type PDFDocument from "pdfkit";
import { BLOCK, CAUTION, GREEN, INK_3, MASK, NOTE, TRACE } from "./ink";

/** The status marks of the design: shape first, then colour, and a word always stands beside them. */
export type MarkKind = "ok" | "block" | "caution" | "note" | "aside";

type Doc = typeof PDFDocument.prototype;

/** A mark of `size` points with its upper left corner at x, y. */
export function drawMark(doc: Doc, kind: MarkKind, x: number, y: number, size: number): void {
  const [cx, cy, r] = [x + size / 2, y + size / 2, size / 2];
  doc.save().lineWidth(size * 0.13).lineCap("round");
  switch (kind) {
    case "ok":
      doc.circle(cx, cy, r).fill(GREEN);
      doc.moveTo(cx - r * 0.5, cy).lineTo(cx - r * 0.1, cy + r * 0.42).lineTo(cx + r * 0.5, cy - r * 0.4).stroke("#FFFFFF");
      break;
    case "block":
      doc.rect(x, y, size, size).fill(BLOCK);
      doc.moveTo(cx - r * 0.5, cy - r * 0.5).lineTo(cx + r * 0.5, cy + r * 0.5).moveTo(cx + r * 0.5, cy - r * 0.5).lineTo(cx - r * 0.5, cy + r * 0.5).stroke("#FFFFFF");
      break;
    case "caution":
      doc.moveTo(cx, y).lineTo(x + size, y + size).lineTo(x, y + size).closePath().fill(CAUTION);
      doc.moveTo(cx, y + size * 0.4).lineTo(cx, y + size * 0.66).stroke("#FFFFFF");
      doc.circle(cx, y + size * 0.84, size * 0.07).fill("#FFFFFF");
      break;
    case "note":
      doc.circle(cx, cy, r * 0.88).stroke(NOTE);
      doc.moveTo(cx, cy - r * 0.05).lineTo(cx, cy + r * 0.45).stroke(NOTE);
      doc.circle(cx, cy - r * 0.42, size * 0.08).fill(NOTE);
      break;
    case "aside":
      doc.circle(cx, cy, r * 0.88).stroke(INK_3);
      doc.moveTo(cx - r * 0.6, cy + r * 0.6).lineTo(cx + r * 0.6, cy - r * 0.6).stroke(INK_3);
      break;
  }
  doc.restore();
}

/** A via of the log's trace: ring = entry, square = something differed, full disc = signed or verified, thin ring = set aside. */
export function drawVia(doc: Doc, kind: "entry" | "differs" | "signed" | "set-aside", cx: number, cy: number): void {
  doc.save();
  if (kind === "differs") doc.rect(cx - 3, cy - 3, 6, 6).fill(BLOCK);
  else if (kind === "signed") doc.circle(cx, cy, 3.2).fill(MASK);
  else if (kind === "set-aside") doc.lineWidth(0.7).circle(cx, cy, 2.8).fillAndStroke("#FFFFFF", INK_3);
  else doc.lineWidth(1.5).circle(cx, cy, 2.5).fillAndStroke("#FFFFFF", TRACE);
  doc.restore();
}
