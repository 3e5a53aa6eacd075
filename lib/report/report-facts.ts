import type { EntryKind } from "@/lib/core/custody-actions";
import type { StartUpFacts } from "@/lib/core/start-up";
import type { AsSent, BoardRole, Bus, Encryption, EraseCause, PhotoKind, Policy, Role, SizeSource, TransferKind } from "@/lib/core/words";
import type { PersonView, ReadView } from "@/lib/views";

/** What a report is made from: the case as in case.json, the logs up to their heads, and what the strips show. Plain data. */

/** the stored bytes were given up before this bundle was made */
export interface ReportErased {
  at: string;
  cause: EraseCause;
}

export type ReportRead = Omit<ReadView, "chipId" | "imageSound" | "fileName" | "erased"> & { erased?: ReportErased; name: string; path: string; originalFileName: string };

export interface ReportApproval {
  id: string;
  sha256: string;
  crc32: string | null;
  /** "Read 6" where the image is a composite */
  composite: string | null;
  donorChip: string;
  approvedBy: PersonView;
  givenAt: string;
  statement: string;
  reasons: Record<string, string>;
  twoPersonRule: boolean;
  revoked: { at: string; by: PersonView; cause: string | null; reason: string | null } | null;
}

export interface ReportTransfer {
  id: string;
  approval: string;
  kind: TransferKind;
  donorChip: string;
  programmer: string | null;
  toolVersion: string | null;
  adapter: string | null;
  note: string | null;
  by: PersonView;
  at: string;
}

export interface ReportChip {
  designator: string;
  id: string;
  bus: Bus;
  sizeBytes: number;
  sizeSource: SizeSource;
  supplyMillivolts: number | "unknown";
  package: string | null;
  marking: string | null;
  holds: string | null;
  needsTransfer: boolean;
  pairedWith: string | null;
  /** thousandths of the picture of its board */
  place?: { x: number; y: number } | null;
  recordedAt: string;
  reads: ReportRead[];
  approvalRequests: { id: string; askedBy: PersonView; askedAt: string; message: string | null; sentBack: { by: PersonView; at: string; reason: string | null } | null }[];
  approvals: ReportApproval[];
  transfers: ReportTransfer[];
}

export interface ReportBoard {
  label: string;
  id: string;
  role: BoardRole;
  boardNumber: string;
  revision: string | null;
  controllerMarking: string | null;
  motorDriverMarking: string | null;
  condition: string | null;
  dataInController?: boolean;
  recordedAt: string;
  fit: { verdict: "fits" | "caution" | "other-number"; differences: string[]; reason: string | null } | null;
  chips: ReportChip[];
}

/** a photo or document; the originals lie in the bundle */
export interface ReportPhoto {
  /** its id */
  photo: string;
  /** where in the bundle; null where the original is damaged, missing or erased */
  file: string | null;
  erased?: ReportErased;
  sha256: string;
  sizeBytes: number;
  kind: PhotoKind;
  /** "the original board BX 40-3179" */
  of: string;
  originalFileName: string;
  caption: string | null;
  storedAt: string;
  by: PersonView | "customer";
}

export type ReportStartUp = StartUpFacts & { at: string; by: string; note: string | null };

/** the parcel as it came, beside what was asked for */
export interface ReportReceipt {
  at: string;
  by: string;
  condition: string;
  carrier: string | null;
  tracking: string | null;
  sealAsSent: AsSent;
  sealNumber: string | null;
  smallBoard: AsSent;
  accessories: string | null;
  differs: string | null;
}

/** what went back to the customer, and how */
export interface ReportReturn {
  at: string;
  by: string;
  to: string;
  items: string[];
  carrier: string | null;
  tracking: string | null;
  sealNumber: string | null;
  note: string | null;
}

export interface ReportDrive {
  number: number;
  letter: string;
  id: string;
  partNumber: string | null;
  model: string | null;
  serial: string | null;
  interface: string | null;
  capacity?: string | null;
  made?: string | null;
  firmware?: string | null;
  encryption?: Encryption | null;
  recordedAt: string;
  logUpTo: { seq: number; hash: string };
  boards: ReportBoard[];
  startUpTests?: ReportStartUp[];
  photos?: ReportPhoto[];
}

/** case.json */
export interface ReportCase {
  workshop: string;
  madeAt: string;
  policy: Policy;
  ref: string;
  id: string;
  /** when the customer asked, where that came first */
  requestedAt?: string | null;
  /** null while the drives are still on their way */
  receivedAt: string | null;
  /** null where the customer's own request made it */
  recordedBy: PersonView | null;
  damage: string;
  note: string | null;
  dueOn: string | null;
  closedAt: string | null;
  closedReason: string | null;
  receipt?: ReportReceipt | null;
  returned?: ReportReturn | null;
  customer: { name: string; email: string; phone: string | null; contact: string | null };
  drives: ReportDrive[];
  photos?: ReportPhoto[];
}

export interface ReportEntry {
  seq: number;
  at: string;
  who: string;
  role: Role | "system";
  action: string;
  sentence: string;
  kind: EntryKind;
  /** SHA-256 of the body */
  hash: string;
  /** of the actions that a section of its own lists; null of the others */
  facts: Record<string, unknown> | null;
}

/** What the pictures and verdicts of a case show, fixed when the bundle was started. */
export interface ReportDrawing {
  /** by the id of the original's chip */
  states: Record<string, { label: string; sentence: string }>;
  /** 256 cells over each image's own size, by SHA-256 */
  strips: Record<string, string>;
  /** differing bytes in each of 256 cells, by "A:B"; a pair that was never compared is missing */
  lanes: Record<string, { differingBytes: number; cells: number[] }>;
}

export interface ReportFacts {
  record: ReportCase;
  drawing: ReportDrawing;
  /** in the order of the record's drives */
  logs: ReportEntry[][];
  /** SHA-256 of the public keys */
  logKey: string;
  seal: { number: number; sha256: string; keyFingerprint: string } | null;
  /** false when any approval of the case was given without it */
  twoPersonRule: boolean;
  /** small JPEG copies of photos by the original's digest, without metadata */
  pictures?: ReadonlyMap<string, Buffer>;
}
