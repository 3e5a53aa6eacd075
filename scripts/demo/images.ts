import { KIB } from "@/lib/limits";
import { below, type Random, randomFrom } from "./random";

/**
 * The demo's chip images. They only look like what such chips hold: areas of every class that a strip can show, made
 * from a fixed seed, so that the demo is the same everywhere.
 */
export interface ImageName {
  /** the drive's part number: boards of one kind share their program area */
  kind: string;
  /** one board: its own tables and texts */
  unit: string;
}

const WORDS = [
  "spin", "motor", "zone", "head", "park", "servo", "track", "cache", "queue", "gain", "offset", "retry", "limit", "ready", "table", "boot",
  "check", "stage", "lane", "clock", "phase", "ramp", "load", "temp", "serial", "board", "write", "read", "hold", "level", "ring", "map",
];

type Fill = (area: Buffer, random: Random) => void;

const dense: Fill = (area, random) => {
  for (let i = 0; i < area.length; i += 1) area[i] = below(random, 256);
};

/** Low values are commoner, as in code and tables. Never FF, so that a lost contact shows in every byte that it touches. */
const ordinary: Fill = (area, random) => {
  for (let i = 0; i < area.length; i += 1) area[i] = Math.floor(random() ** 3 * 255);
};

const text: Fill = (area, random) => {
  let at = 0;
  while (at < area.length) {
    const line = `${WORDS[below(random, WORDS.length)]} ${WORDS[below(random, WORDS.length)]} ${below(random, 4096)}\r\n`;
    at += area.write(line, at, "latin1");
    if (area.length - at < line.length) area.fill(0x20, at);
  }
};

const zeros: Fill = (area) => void area.fill(0x00);
const blank: Fill = (area) => void area.fill(0xff);

/** Share of the chip in 256ths, what lies there, and whether all boards of the kind share it. */
type Area = readonly [cells: number, fill: Fill, shared: boolean];

const FIRMWARE: readonly Area[] = [
  [2, ordinary, true], [1, text, true], [46, dense, true], [9, ordinary, true], [3, text, false], [3, ordinary, false],
  [7, zeros, true], [38, dense, true], [14, ordinary, true], [6, text, true], [9, blank, true], [22, dense, true], [17, ordinary, true],
  [4, text, false], [6, zeros, true], [8, ordinary, false], [19, blank, true], [2, ordinary, false], [40, blank, true],
];

const SETTINGS: readonly Area[] = [
  [8, text, false], [24, ordinary, false], [8, zeros, true], [30, ordinary, false], [6, text, false], [20, blank, true], [44, ordinary, false],
  [12, zeros, true], [26, ordinary, false], [14, text, false], [40, blank, true], [4, ordinary, false], [20, blank, true],
];

/** The first areas keep their place: a lost contact of the demo lies in the tables at 0x1F000. */
const FIXED = 7;

/** Shifts the later borders of a kind's areas, so that two kinds of board don't look alike. */
function bordersOf(areas: readonly Area[], random: Random): readonly number[] {
  const cells: number[] = areas.map(([n]) => n);
  for (let i = FIXED; i + 1 < cells.length; i += 1) {
    const most = Math.min(14, Math.floor(cells[i + 1] / 2), Math.floor(cells[i] / 2));
    const by = below(random, 2 * most + 1) - most;
    cells[i] += by;
    cells[i + 1] -= by;
  }
  return cells;
}

function draw(areas: readonly Area[], sizeBytes: number, { kind, unit }: ImageName): Buffer {
  const image = Buffer.alloc(sizeBytes);
  const [ofKind, ofUnit] = [randomFrom(`kind ${kind} ${sizeBytes}`), randomFrom(`unit ${kind} ${unit} ${sizeBytes}`)];
  let at = 0;
  for (const [index, cells] of bordersOf(areas, ofKind).entries()) {
    const [, fill, shared] = areas[index];
    const end = index === areas.length - 1 ? sizeBytes : at + (cells * sizeBytes) / 256;
    fill(image.subarray(at, end), shared ? ofKind : ofUnit);
    at = end;
  }
  return image;
}

/** 512 KiB as a firmware chip may hold them. */
export const firmware = (name: ImageName): Buffer => draw(FIRMWARE, 512 * KIB, name);

/** 8 KiB as a chip with settings may hold them. */
export const settings = (name: ImageName): Buffer => draw(SETTINGS, 8 * KIB, name);
