import type { Sibling } from "@/lib/core/two-chips";
import type { BoardRole, Bus, ChipStateCode, Encryption, Policy, SizeSource, Stage } from "@/lib/core/words";
import type { ApprovalRequestView, ApprovalView, TransferView } from "./approval";
import type { PersonView } from "./person";
import type { GroupView, ReadView } from "./read";
import type { StripStackView } from "./strip";

export interface StateView {
  state: ChipStateCode;
  label: string;
  sentence: string;
}

/** One line of the approval section: met or not, with the rule and its value in words. */
export interface ConditionView {
  key: string;
  rule: string;
  value: string;
  state: "met" | "open" | "against";
}

/** An image that nothing read as a whole: which read it is kept as, of how many reads it was made, in how many seatings. */
export interface CompositeMark {
  number: number;
  reads: number;
  seatings: number;
}

export interface ChipSummary {
  id: string;
  designator: string;
  boardRole: BoardRole;
  bus: Bus;
  sizeBytes: number;
  sizeSource: SizeSource;
  supplyMillivolts: number | null;
  package: string | null;
  marking: string | null;
  holds: string | null;
  /** what the chip answered of itself, as lower-case hex: three id bytes, and its SFDP table */
  idBytes: string | null;
  sfdp: string | null;
  needsTransfer: boolean;
  /** where it sits on the picture of its board, in thousandths from the left and from the top; null until placed */
  place: { x: number; y: number } | null;
  state: StateView;
  /** the paired chip, if any */
  pair: { id: string; designator: string; boardId: string; boardNumber: string; sizeBytes: number } | null;
  /** counted reads: of the original's `before`, of a donor's `donor` */
  countedReads: number;
  agreeingReads: number;
  donorSaved: boolean;
  /** strip thumbnails: at most two distinct images, 64 cells, and the lane between them; two reads, or the approved image over a read-back that differs */
  thumbnail: { images: string[]; lane: number[] | null; shows: "reads" | "read-back" };
  /** set when the image that the chip stands for, approved or still to be approved, is a composite */
  composite: CompositeMark | null;
}

export interface ChipView extends ChipSummary {
  drive: { id: string; letter: string; partNumber: string | null; model: string | null; serial: string | null; encryption: Encryption | null };
  /** the other chips of the original that are moved together with this one, for a donor's chip with its pair */
  siblings: Sibling[];
  board: { id: string; role: BoardRole; boardNumber: string; revision: string | null };
  /** a case that is not open takes no change */
  case: { id: string; ref: string; dueOn: string | null; customerName: string; open: boolean };
  policy: Policy;
  /** the chip's own reads and, for an original, also the paired donor chip's reads */
  reads: ReadView[];
  groups: GroupView[];
  matrix: MatrixView;
  stack: StripStackView;
  conditions: ConditionView[];
  /** people who may approve by the two-person rule */
  approvers: PersonView[];
  approval: ApprovalView | null;
  approvals: ApprovalView[];
  request: ApprovalRequestView | null;
  transfers: TransferView[];
  /** what stands on the page as verdict: the sentence and the paragraph that says why */
  why: string;
  nextSeating: Record<Stage, number>;
  receivedAt: string;
}

/** Differing bytes between each two counted reads of one stage. `null` on the diagonal. */
export interface MatrixView {
  reads: { number: number; name: string }[];
  cells: (number | "other-size" | null)[][];
}

/** The approved image against the counted read-backs of the latest transfer. */
export interface ReadBackView {
  /** the original's chip: its approval is what they are held against */
  chipId: string;
  /** differing bytes of each read-back */
  backs: { number: number; name: string; differs: number | "other-size" }[];
  stack: StripStackView;
}
