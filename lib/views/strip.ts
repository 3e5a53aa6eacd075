import type { DiagnosisView } from "@/lib/core/diagnosis";
import type { Range } from "@/lib/core/words";
import type { ReadView } from "./read";

/** One letter a cell: see lib/core/strip.ts. b blank, z zeros, t text-like, o ordinary, d dense, n not read. */
export type CellString = string;

export interface StripRow {
  readId: string;
  name: string;
  note: string;
  cells: CellString;
}

export interface StripLane {
  differingBytes: number;
  /** differing bytes a cell; null when all is equal */
  cells: number[] | null;
}

export interface StripView {
  offset: number;
  cellBytes: number;
  rows: StripRow[];
  /** lanes[i] lies between rows[i] and rows[i+1] */
  lanes: StripLane[];
}

export interface StripStackView extends StripView {
  sizeBytes: number;
  loupe: StripView | null;
}

export type { DiagnosisView };

export interface ComparisonView {
  equal: boolean;
  differingBytes: number;
  differingBits: { zeroToOne: number; oneToZero: number };
  ranges: Range[];
  truncated?: true;
  diagnosis: DiagnosisView;
}

/** Two or three reads for the compare page; of three, the ranges are those in which not all agree. */
export interface ComparedReads extends Omit<ComparisonView, "differingBits"> {
  reads: ReadView[];
  /** from the first to the second; null for three reads */
  differingBits: ComparisonView["differingBits"] | null;
  stack: StripStackView;
}
