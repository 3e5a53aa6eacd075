/**
 * How a window of an image is divided into cells. Cell i of n over `length` bytes holds the bytes whose address,
 * from the window's start, lies in [ceil(i*length/n), ceil((i+1)*length/n)). In a window with fewer bytes than
 * cells several neighbouring cells show the same byte, so that a strip is always full.
 */
export interface CellWindow {
  /** absolute address of the first byte */
  offset: number;
  /** bytes */
  length: number;
  cells: number;
}

export interface CellMap {
  /** cells that really hold something of their own: min(cells, length) */
  bins: number;
  binOf(relative: number): number;
  binStart(bin: number): number;
  binOfCell(cell: number): number;
}

export function mapCells({ length, cells }: CellWindow): CellMap {
  const bins = Math.min(cells, length);
  return {
    bins,
    binOf: (relative) => Math.floor((relative * bins) / length),
    binStart: (bin) => Math.ceil((bin * length) / bins),
    binOfCell: (cell) => Math.floor((cell * bins) / cells),
  };
}

/** Counts per bin spread over all cells. */
export function spreadBins(counts: ArrayLike<number>, map: CellMap, cells: number): number[] {
  if (map.bins === 0) return new Array<number>(cells).fill(0);
  return Array.from({ length: cells }, (_, cell) => counts[map.binOfCell(cell)]);
}

/** Adds 1 a byte of [from, to), relative to the window, to the bins it touches. */
export function addRun(counts: Float64Array, map: CellMap, from: number, to: number): void {
  for (let at = from; at < to; ) {
    const bin = map.binOf(at);
    const end = Math.min(to, map.binStart(bin + 1));
    counts[bin] += end - at;
    at = end;
  }
}

export interface CellCounters {
  map: CellMap;
  /** `at` is the absolute address of the chunk's first byte; what lies outside the window is passed over */
  push(chunk: Uint8Array, at: number): void;
  /** the 256 byte counts of one bin */
  histogram(bin: number): Uint32Array;
  /** bytes seen in one bin */
  seen(bin: number): number;
}

/** One byte histogram a cell: 256 KiB for 256 cells, whatever the image's size. */
export function createCellCounters(window: CellWindow): CellCounters {
  const map = mapCells(window);
  const counts = new Uint32Array(map.bins * 256);
  const histogram = (bin: number) => counts.subarray(bin * 256, bin * 256 + 256);
  return {
    map,
    histogram,
    seen: (bin) => histogram(bin).reduce((sum, n) => sum + n, 0),
    push(chunk, at) {
      let i = Math.max(0, window.offset - at);
      const end = Math.min(chunk.length, window.offset + window.length - at);
      while (i < end) {
        const bin = map.binOf(at + i - window.offset);
        const stop = Math.min(end, window.offset + map.binStart(bin + 1) - at);
        const base = bin * 256;
        for (; i < stop; i += 1) counts[base + chunk[i]] += 1;
      }
    },
  };
}
