import type { BoardFacts } from "./bench-work";
import { Canvas, type Colour } from "./canvas";
import { below, randomFrom, type Random } from "./random";

/** The demo's photos: drawn, not taken, from a fixed seed. They show what such photos are of, and no board that exists. */

const MAT: Colour = [118, 124, 128];
const MASK: Colour = [24, 84, 62];
const TRACE: Colour = [36, 112, 82];
const PAD: Colour = [196, 164, 96];
const SILK: Colour = [226, 230, 218];
const BODY: Colour = [38, 38, 40];
const LEAD: Colour = [178, 182, 184];
const STEEL: Colour = [172, 176, 180];
const WHITE: Colour = [238, 236, 228];
const INK: Colour = [32, 32, 34];
const SOOT: Colour = [22, 18, 16];

const WIDE = 960;
const HIGH = 640;

/** Where a chip lies on each board, in thousandths of the photo. */
export const PLACES = { U3: { x: 219, y: 712 }, U12: { x: 834, y: 675 } } as const;

interface BoardPhoto extends BoardFacts {
  designators: readonly (keyof typeof PLACES)[];
  /** the corner that the surge reached */
  scorched?: boolean;
}

/** A drive's board from above, on the bench mat. */
export function boardPhoto({ boardNumber, revision, controllerMarking = "", motorDriverMarking = "", designators, scorched = false }: BoardPhoto): Promise<Buffer> {
  const random = randomFrom(`photo of ${boardNumber} ${revision} ${designators.join(" ")} ${scorched}`);
  const canvas = new Canvas(WIDE, HIGH, MAT);
  canvas.box(60, 50, 840, 540, [13, 48, 36]);
  canvas.box(64, 54, 832, 532, MASK);
  canvas.disc(480, 600, 96, MAT);
  traces(canvas, random);
  connectors(canvas);
  parts(canvas, random);
  square(canvas, 300, 220, 170, controllerMarking);
  square(canvas, 610, 190, 120, motorDriverMarking);
  for (const designator of designators) chip(canvas, designator);
  for (const [x, y] of [[98, 92], [862, 92], [98, 552], [862, 552]] as const) {
    canvas.disc(x, y, 22, PAD);
    canvas.disc(x, y, 13, MAT);
  }
  canvas.write(`${boardNumber} ${revision}`.toUpperCase(), 330, 88, 22, SILK);
  if (scorched) scorch(canvas, random);
  canvas.develop(random);
  return canvas.jpeg();
}

function traces(canvas: Canvas, random: Random): void {
  for (let i = 0; i < 46; i += 1) {
    const [x, y, across, down] = [110 + below(random, 640), 120 + below(random, 400), 40 + below(random, 130), 20 + below(random, 70)];
    const end = [Math.min(820, x + across + down), Math.min(560, y + down)] as const;
    canvas.line([[x, y], [Math.min(820, x + across), y], end], 3, TRACE);
    canvas.disc(x, y, 5, PAD);
    canvas.disc(end[0], end[1], 5, PAD);
  }
}

function connectors(canvas: Canvas): void {
  for (let i = 0; i < 22; i += 1) canvas.box(130 + i * 15, 54, 9, 26, PAD);
  for (let i = 0; i < 14; i += 1) canvas.box(844, 170 + i * 18, 44, 9, PAD);
  for (const [x, y] of [[400, 470], [452, 452], [508, 452], [560, 470]] as const) canvas.disc(x, y, 11, PAD);
}

/** Small parts in rows: two silver ends and a body. */
function parts(canvas: Canvas, random: Random): void {
  for (const [x, y, count] of [[130, 150, 5], [130, 182, 5], [500, 230, 4], [500, 262, 4], [600, 380, 5], [600, 410, 5], [300, 440, 4]] as const) {
    for (let i = 0; i < count; i += 1) {
      if (below(random, 6) === 0) continue;
      canvas.box(x + i * 34, y, 24, 12, LEAD);
      canvas.box(x + i * 34 + 5, y, 14, 12, below(random, 2) === 0 ? [122, 96, 66] : BODY);
    }
  }
}

/** A large part with leads on all four sides. */
function square(canvas: Canvas, x: number, y: number, edge: number, marking: string): void {
  for (let at = 8; at < edge - 8; at += 9) {
    canvas.box(x + at, y - 9, 5, edge + 18, LEAD);
    canvas.box(x - 9, y + at, edge + 18, 5, LEAD);
  }
  canvas.box(x, y, edge, edge, BODY);
  canvas.disc(x + 16, y + edge - 16, 5, [74, 74, 78]);
  canvas.write(marking, x + 16, y + edge / 2 - 8, edge / 9, [128, 130, 132], 1.6);
}

/** A memory chip with two rows of four leads, its designator beside it. */
function chip(canvas: Canvas, designator: keyof typeof PLACES): void {
  const { x, y } = PLACES[designator];
  const [width, height] = designator === "U3" ? [92, 66] : [64, 44];
  const [left, top] = [(x / 1000) * WIDE - width / 2, (y / 1000) * HIGH - height / 2];
  for (let i = 0; i < 4; i += 1) canvas.box(left + (width / 4) * i + width / 8 - 5, top - 13, 10, height + 26, LEAD);
  canvas.box(left, top, width, height, BODY);
  canvas.disc(left + 11, top + height - 11, 4, [92, 92, 96]);
  canvas.write(designator === "U3" ? "A7 0442" : "64C", left + 12, top + height / 2 - 6, 10, [134, 136, 138], 1.4);
  canvas.write(designator, left - 4, top + height + 22, 15, SILK);
}

function scorch(canvas: Canvas, random: Random): void {
  for (let i = 0; i < 260; i += 1) {
    const [turn, far] = [random() * 2 * Math.PI, random() ** 1.6 * 62];
    canvas.disc(172 + Math.cos(turn) * far, 300 + Math.sin(turn) * far, 3 + random() * 7, far < 30 ? SOOT : [52, 44, 34]);
  }
  canvas.box(150, 284, 46, 34, [30, 26, 24]);
  canvas.line([[156, 290], [170, 300], [166, 310], [188, 314]], 2, [120, 104, 84]);
}

interface LabelPhoto {
  partNumber: string;
  serial: string;
  model?: string;
}

/** A drive's lid with its label. */
export function labelPhoto({ partNumber, serial, model = "3.5 IN SATA" }: LabelPhoto): Promise<Buffer> {
  const random = randomFrom(`photo of ${partNumber} ${serial}`);
  const canvas = new Canvas(WIDE, HIGH, MAT);
  canvas.box(40, 44, 880, 552, [120, 122, 126]);
  canvas.box(46, 50, 868, 540, STEEL);
  for (const [x, y] of [[84, 88], [480, 82], [876, 88], [84, 552], [480, 558], [876, 552]] as const) {
    canvas.disc(x, y, 17, [96, 98, 102]);
    canvas.line([[x - 8, y], [x + 8, y]], 4, [52, 54, 56]);
  }
  canvas.box(150, 132, 660, 376, [150, 150, 146]);
  canvas.box(152, 134, 656, 372, WHITE);
  canvas.write(`PN ${partNumber.replace(/^PN /, "")}`, 182, 168, 34, INK);
  canvas.write(`SN ${serial}`, 182, 236, 34, INK);
  canvas.write(model, 182, 306, 24, INK);
  canvas.write("5 V 0.7 A  12 V 0.9 A", 182, 352, 18, INK);
  for (let x = 182; x < 770;) {
    const wide = 2 + below(random, 4);
    canvas.box(x, 402, wide, 72, INK);
    x += wide + 2 + below(random, 5);
  }
  canvas.develop(random);
  return canvas.jpeg();
}
