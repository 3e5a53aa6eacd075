import type { BoardRole, Bus, Policy, Stage } from "@/lib/core/words";
import type { CaseView } from "./case";
import type { PersonView } from "./person";
import type { ReceiptView } from "./request";

/** One printed label: which plate it carries, the large word on it, and the lines below. */
export interface LabelView {
  key: string;
  kind: "drive" | "original" | "donor" | "chip";
  refChecked: string;
  /** "Drive A", "Original board", "U12" */
  title: string;
  /** of a chip: whose board it sits on, and what may be put on its supply pin */
  chip: { board: BoardRole; supplyMillivolts: number | null; pins: number } | null;
  lines: { name: string; value: string }[];
}

/** What goes to the programmer by hand: the approval that stands, or the last one, revoked. */
export interface WriteTicketView {
  refChecked: string;
  driveLetter: string;
  designator: string;
  holds: string | null;
  donor: { designator: string; boardNumber: string; revision: string | null; marking: string | null };
  /** the name under which the image is handed out */
  imageName: string;
  sha256: string;
  crc32: string;
  sizeBytes: number;
  supplyMillivolts: number | null;
  /** the reader or programmer that was used last */
  programmer: string | null;
  approvedBy: string;
  approvedAt: string;
  statement: string;
  twoPersonRule: boolean;
  composite: boolean;
  /** the other chips that are moved with this one and how far they are; null for a chip that stands alone */
  together: string | null;
  /** the drive is, or may be, encrypted: keep its small board with it */
  encrypted: boolean;
  revoked: { by: string; at: string; cause: string; reason: string } | null;
}

/** A case and what its papers say besides. */
export interface PrintCaseView {
  case: CaseView;
  receipt: ReceiptView | null;
  returned: { items: string[]; toPerson: string; carrier: string | null; tracking: string | null; sealNumber: string | null; note: string | null; by: PersonView; at: string } | null;
  policy: Policy;
  workshop: string;
  workshopAddress: string[];
  timeZone: string;
  printedAt: string;
  company: string | null;
  returnAddress: string | null;
}

/** A sheet for the bench without a screen: the chip, its reads so far, room for more. */
export interface ReadSheetView {
  key: string;
  refChecked: string;
  driveLetter: string;
  board: BoardRole;
  boardNumber: string;
  revision: string | null;
  designator: string;
  bus: Bus;
  package: string | null;
  marking: string | null;
  sizeBytes: number;
  supplyMillivolts: number | null;
  /** the drive is encrypted, or may be */
  encrypted: boolean;
  stages: {
    stage: Stage;
    reads: { number: number; seating: number; reader: string; supplyMillivolts: number | null; crc32: string; sha256: string; operator: string; at: string; counted: boolean }[];
  }[];
}
