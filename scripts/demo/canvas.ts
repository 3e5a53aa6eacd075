import sharp from "sharp";
import { STROKES } from "./lettering";
import type { Random } from "./random";

export type Colour = readonly [red: number, green: number, blue: number];

/** Drawn twice as large and made smaller at the end, so that edges come out smooth. */
const FINER = 2;

/** A picture drawn dot by dot: the same bytes on every machine, whatever fonts it has. */
export class Canvas {
  readonly #wide: number;
  readonly #high: number;
  readonly #dots: Uint8Array;

  constructor(readonly width: number, readonly height: number, ground: Colour) {
    [this.#wide, this.#high] = [width * FINER, height * FINER];
    this.#dots = new Uint8Array(this.#wide * this.#high * 3);
    this.box(0, 0, width, height, ground);
  }

  box(x: number, y: number, width: number, height: number, colour: Colour): void {
    const [left, right] = [Math.max(0, Math.round(x * FINER)), Math.min(this.#wide, Math.round((x + width) * FINER))];
    const [top, bottom] = [Math.max(0, Math.round(y * FINER)), Math.min(this.#high, Math.round((y + height) * FINER))];
    for (let row = top; row < bottom; row += 1) for (let at = left; at < right; at += 1) this.#dot(row, at, colour);
  }

  disc(x: number, y: number, radius: number, colour: Colour): void {
    const [mx, my, r] = [x * FINER, y * FINER, radius * FINER];
    for (let row = Math.max(0, Math.floor(my - r)); row <= Math.min(this.#high - 1, my + r); row += 1) {
      const half = Math.sqrt(Math.max(0, r * r - (row - my) ** 2));
      for (let at = Math.max(0, Math.ceil(mx - half)); at <= Math.min(this.#wide - 1, mx + half); at += 1) this.#dot(row, at, colour);
    }
  }

  /** A line with round ends through all points. */
  line(points: readonly (readonly [x: number, y: number])[], thick: number, colour: Colour): void {
    for (const [index, [x, y]] of points.entries()) {
      const [fromX, fromY] = points[Math.max(0, index - 1)];
      const steps = Math.max(1, Math.ceil((Math.hypot(x - fromX, y - fromY) * FINER) / Math.max(1, thick / 2)));
      for (let step = 0; step <= steps; step += 1) {
        this.disc(fromX + ((x - fromX) * step) / steps, fromY + ((y - fromY) * step) / steps, thick / 2, colour);
      }
    }
  }

  /** Capitals, figures and a few signs, as a pen would print them; `tall` is the height of a capital. */
  write(text: string, x: number, y: number, tall: number, colour: Colour, thick = tall / 9): void {
    const unit = tall / 6;
    for (const [index, letter] of [...text].entries()) {
      const left = x + index * unit * 5.6;
      for (const stroke of STROKES[letter]?.split(" ") ?? []) {
        const points = Array.from({ length: stroke.length / 2 }, (_, i) => [left + Number(stroke[2 * i]) * unit, y + Number(stroke[2 * i + 1]) * unit] as const);
        this.line(points, thick, colour);
      }
    }
  }

  /** What a lens adds: grain, and light that falls off from one corner. */
  develop(random: Random): void {
    for (let row = 0; row < this.#high; row += FINER) {
      for (let at = 0; at < this.#wide; at += FINER) {
        const light = 1.06 - 0.3 * Math.hypot(at / this.#wide - 0.35, row / this.#high - 0.3);
        const grain = (random() - 0.5) * 8;
        for (let dot = 0; dot < FINER * FINER; dot += 1) {
          const from = ((row + Math.floor(dot / FINER)) * this.#wide + at + (dot % FINER)) * 3;
          for (let part = from; part < from + 3; part += 1) this.#dots[part] = Math.min(255, Math.max(0, this.#dots[part] * light + grain));
        }
      }
    }
  }

  jpeg(): Promise<Buffer> {
    return sharp(this.#dots, { raw: { width: this.#wide, height: this.#high, channels: 3 } }).resize(this.width, this.height).jpeg({ quality: 84 }).toBuffer();
  }

  #dot(row: number, at: number, [red, green, blue]: Colour): void {
    const from = (row * this.#wide + at) * 3;
    this.#dots[from] = red;
    this.#dots[from + 1] = green;
    this.#dots[from + 2] = blue;
  }
}
