import type { Finding, TransferKind } from "@/lib/core/words";
import type { BoardView } from "./board";
import type { ChipSummary, ChipView } from "./chip";
import type { PersonView } from "./person";
import type { ReadView } from "./read";
import type { StripStackView } from "./strip";

export interface ApprovalView {
  id: string;
  sha256: string;
  donorChipId: string;
  approvedBy: PersonView;
  givenAt: string;
  statement: string;
  reasons: Record<string, string>;
  twoPersonRule: boolean;
  revoked: { at: string; by: PersonView; cause: string; reason: string } | null;
}

export interface TransferView {
  id: string;
  approvalId: string;
  kind: TransferKind;
  donorChipId: string;
  programmer: string | null;
  toolVersion: string | null;
  adapter: string | null;
  note: string | null;
  by: PersonView;
  at: string;
}

export interface ApprovalRequestView {
  id: string;
  askedBy: PersonView;
  askedAt: string;
  message: string | null;
  sentBack: { by: PersonView; at: string; reason: string } | null;
}

/** What the decision sheet shows beyond the chip: the image, where it would go, and how the reads set aside differ from it. */
export interface DecisionView {
  chip: ChipView;
  /** the image of the largest agreeing group, or the approved one; null while nothing is read */
  image: { sha256: string; crc32: string; sizeBytes: number; reads: number[]; seatings: number[] } | null;
  /** findings of severity `blocks` or `reason`; `read` is null for one on the chip as a whole */
  open: { read: number | null; finding: Finding }[];
  donor: { board: BoardView; chip: ChipSummary; own: ReadView[] } | null;
  /** the image over the donor's own content; null until both are there */
  stack: StripStackView | null;
  donorDiffers: number | null;
  /** per `before` read set aside: bytes that differ from the image, and where */
  setAside: { read: ReadView; differingBytes: number; place: string | null }[];
}
