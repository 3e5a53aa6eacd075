import { withCommas } from "@/lib/core/quantity";
import { code, plain, quiet, RULE_2, strong } from "./ink";
import type { ReportFacts, ReportPhoto } from "./report-facts";
import { erasedText, momentText } from "./report-words";
import { LEFT, RIGHT, type Sheet } from "./sheet";

const [BOX_WIDTH, BOX_HEIGHT, PAD] = [156, 117, 4];
/** neutral, so that nothing around a photo tints what is seen in it */
const MAT = "#D9D9D7";

/** Photos and documents under each other: a small copy, and beside it what it is and where the original lies. */
export async function photoPart(sheet: Sheet, facts: Pick<ReportFacts, "pictures">, photos: readonly ReportPhoto[]): Promise<void> {
  for (const photo of photos) {
    onePhoto(sheet, facts.pictures?.get(photo.sha256) ?? null, photo);
    await sheet.breathe();
  }
}

function onePhoto(sheet: Sheet, picture: Buffer | null, photo: ReportPhoto): void {
  const by = photo.by === "customer" ? "the customer, with the request" : photo.by.name;
  const x = LEFT + BOX_WIDTH + 12;
  const title = photo.caption ?? (photo.originalFileName.trim() || "Without a name");
  const parts = [
    [strong(title)], [quiet(`Of ${photo.of}. Added by ${by}, ${momentText(photo.storedAt)} UTC.`, { size: 8.5 })],
    ...(photo.caption ? [[quiet("Came as ", { size: 8.5 }), code(photo.originalFileName, { size: 8 })]] : []),
    [code(photo.file ?? (photo.erased ? `not in the bundle: erased, ${erasedText(photo.erased)}` : "not in the bundle: the stored original is damaged or missing"), { size: 8 }), quiet(`, ${withCommas(photo.sizeBytes)} bytes`, { size: 8.5 })],
    [code(photo.sha256, { size: 7.5 })],
  ];
  const lines = parts.flatMap((spans) => sheet.type.lines(spans, RIGHT - x));
  const height = Math.max(lines.reduce((sum, line) => sum + line.height, 0), photo.kind === "photo" ? BOX_HEIGHT : 0);
  sheet.ensure(height + 8);
  const top = sheet.y;
  const figure = sheet.element("Figure", undefined, { alt: `${photo.kind === "photo" ? "Photo" : "Document"} of ${photo.of}: ${title}` });
  sheet.tagged(figure, "Figure", () => (photo.kind === "photo" ? drawBox(sheet, picture, top, photo.erased ? "Not shown: it was erased." : "Not shown: the original can’t be opened.") : undefined));
  figure.end();
  const text = sheet.element("P");
  sheet.tagged(text, "P", () => sheet.put(lines, photo.kind === "photo" ? x : LEFT));
  text.end();
  sheet.y = top + height;
  sheet.space(10);
}

function drawBox({ doc, type }: Sheet, picture: Buffer | null, top: number, without: string): void {
  doc.rect(LEFT, top, BOX_WIDTH, BOX_HEIGHT).fillAndStroke(MAT, RULE_2);
  if (picture) doc.image(picture, LEFT + PAD, top + PAD, { fit: [BOX_WIDTH - 2 * PAD, BOX_HEIGHT - 2 * PAD], align: "center", valign: "center" });
  else type.lines([plain(without, { size: 8 })], BOX_WIDTH - 16).forEach((line, i) => type.draw(line, LEFT + 8, top + 8 + i * line.height));
}
