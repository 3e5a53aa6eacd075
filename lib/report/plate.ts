import type { BoardRole } from "@/lib/core/words";
import { MASK, SILK, strong } from "./ink";
import type { Sheet } from "./sheet";

/** The designator plate: filled for the customer's board, outlined for a donor, the dot is pin 1. Gives back its width. */
export function drawPlate(sheet: Sheet, role: BoardRole, designator: string, x: number, y: number): number {
  const { doc } = sheet;
  const [line] = sheet.type.lines([strong(designator, { face: "mono", size: 10.5, color: role === "original" ? SILK : MASK })], 62);
  const width = line.pieces.reduce((sum, { piece }) => sum + piece.width, 0) + 18;
  doc.save().lineWidth(1.1);
  if (role === "original") doc.rect(x, y, width, 16).fill(MASK);
  else doc.rect(x + 0.5, y + 0.5, width - 1, 15).stroke(MASK);
  doc.circle(x + 5, y + 5, 1.5).fill(role === "original" ? SILK : MASK);
  doc.restore();
  sheet.type.draw(line, x + 11, y + 1);
  return width;
}
