import type { StartUpFacts } from "@/lib/core/start-up";
import type { ChipStateCode, Method, TransferKind, WaitingFor } from "@/lib/core/words";
import type { ChipSummary, CompositeMark } from "./chip";
import type { DriveView } from "./drive";
import type { PersonView } from "./person";
import type { CellString } from "./strip";

/** `number` counts the notes of a case. */
export interface NoteView {
  id: string;
  number: number;
  text: string;
  /** the drive's letter, where it is about one */
  drive: string | null;
  by: PersonView;
  at: string;
  happenedAt: string | null;
  /** set when it was written long after what it tells of */
  lateByHours: number | null;
  corrects: number | null;
  correctedBy: number | null;
}

/** Whom or what a case waits for, and since when. */
export interface HoldView {
  waitingFor: WaitingFor;
  since: string;
  reason: string;
}

/** `requested`: asked for on the public form, the parcel is not here yet. */
export type CaseState = "requested" | "open" | "closed";

export interface CaseView {
  id: string;
  ref: string;
  /** with the ISO 7064 MOD 37,36 check character: 26-0183.4 */
  refChecked: string;
  state: CaseState;
  closedReason: string | null;
  customer: { name: string; email: string; phone: string | null; contact: string | null; company: string | null; returnAddress: string | null };
  /** null when it is not on hold */
  hold: HoldView | null;
  damage: string;
  note: string | null;
  dueOn: string | null;
  /** null while a request waits for its parcel */
  receivedAt: string | null;
  requestedAt: string | null;
  /** null for a request that came through the public form */
  createdBy: PersonView | null;
  drives: DriveView[];
  shares: ShareView[];
}

export interface ShareView {
  id: string;
  createdAt: string;
  createdBy: PersonView;
  expiresAt: string;
  openedAt: string | null;
  withdrawnAt: string | null;
  email: string;
}

export interface CaseRow {
  id: string;
  ref: string;
  customerName: string;
  partNumbers: string;
  damage: string;
  dueOn: string | null;
  /** null while a request waits for its parcel */
  receivedAt: string | null;
  requestedAt: string | null;
  state: CaseState;
  /** the day from which the images of a closed case are due for erasure */
  eraseOn: string | null;
  /** calendar day; null while they are stored */
  erasedOn: string | null;
  chips: { state: ChipStateCode; label: string; designator: string }[];
  /** a board of the case keeps its data inside the controller: there is no chip to move */
  noChipToMove: boolean;
}

export interface BenchRow {
  chip: ChipSummary;
  caseId: string;
  caseRef: string;
  customerName: string;
  partNumber: string;
  dueOn: string | null;
  late: "late" | "today" | null;
  lateDays: number;
  next: string;
  nextWhy: string | null;
  with: string;
  mine: boolean;
  /** null when its case is not on hold */
  hold: HoldView | null;
}

/** The customer's page: no jargon, nothing of the workshop's inside. */
export interface SummaryView {
  workshop: string;
  caseRef: string;
  customerName: string;
  madeAt: string;
  expiresAt: string;
  drives: {
    letter: string;
    label: string;
    chips: {
      designator: string;
      holds: string | null;
      sizeBytes: number;
      verified: boolean;
      stateLabel: string;
      sha256: string | null;
      crc32: string | null;
      agreeingReads: number;
      seatings: number;
      /** the image was put together from several reads: it must say so */
      composite: CompositeMark | null;
      readBacks: number;
      approvedBy: string | null;
      approvedAt: string | null;
      transferredAt: string | null;
      transferKind: TransferKind | null;
      /** how the agreeing reads were taken, each once; empty where nobody said */
      readBy: Method[];
      /** the tool that wrote it, and the adapter, as recorded */
      writtenWith: string | null;
      verifiedAt: string | null;
      cells: CellString | null;
    }[];
    /** the latest start-up test since the transfer */
    startUp: (StartUpFacts & { at: string }) | null;
    head: { seq: number; hash: string };
  }[];
  twoPersonRule: boolean;
  /** what goes back, or went back where `at` is set */
  comesBack: { items: string[]; at: string | null };
  /** the seal that was made when the link was sent; null for a link older than the first seal */
  seal: { number: number; sha256: string; keyId: string } | null;
}
