/**
 * What leaves the house: plain, minimal objects for pages and API. Sizes in bytes, digests lower-case hex,
 * times RFC 3339 UTC text, ids UUIDs. Rows never leave; queries build these.
 */
import type { ClosingFacts } from "./core/closing";
import type { RequestState } from "./core/request-state";
import type { StartUpFacts } from "./core/start-up";
import type { RequestAnswers } from "./schemas/request";
import type { DiagnosisView } from "./core/diagnosis";
import type { DriveWarning } from "./core/drive-warnings";
import type { Sibling } from "./core/two-chips";
import type { SealProof } from "./core/seal";
import type { AskedDrive } from "./core/drive-from-request";
import type {
  AsSent, BoardRole, Bus, ChipStateCode, ClosedKind, Encryption, EraseCause, Finding, Format, ItemType, KeyPurpose, Method, PhotoKind, PhotoSubject, Policy,
  Range, Role, SealCause, SizeSource, Stage, TransferKind, WaitingFor,
} from "./core/words";

export interface PersonView {
  id: string;
  name: string;
  role: Role | "system";
}

/** The stored bytes were given up; digest, size and findings stay. */
export interface ErasedView {
  at: string;
  cause: EraseCause;
  /** the sentence for whoever would open it */
  text: string;
}

export interface ReadView {
  id: string;
  chipId: string;
  number: number;
  stage: Stage;
  seating: number;
  sizeBytes: number;
  /** 8 lower-case hex digits; the screen shows them in upper case */
  crc32: string;
  sha256: string;
  counted: boolean;
  findings: Finding[];
  format: Format;
  fileName: string;
  reader: string;
  method: Method | null;
  toolVersion: string | null;
  adapter: string | null;
  supplyMillivolts: number | "unknown" | null;
  clockKilohertz: number | null;
  controllerHeld: boolean | null;
  note: string | null;
  operator: PersonView;
  /** claimed by the uploader */
  takenAt: string | null;
  modifiedAt: string | null;
  storedAt: string;
  /** for `after` reads: the transfer they belong to */
  transferId: string | null;
  setAside: { reason: string; by: PersonView; at: string } | null;
  /** the text file the image was expanded from */
  source: { sha256: string; base: number; fill: number } | null;
  /** for a composite: how it was made */
  derived: { method: string; voters: number[]; excluded: number[]; disputedBytes: number; weak: number; constructed: number; limit: string } | null;
  /** false when the stored image is damaged, missing or erased */
  imageSound: boolean;
  erased?: ErasedView | null;
}

/** Behind a composite: who voted what for each disputed byte (the stored report, CompositeReport of lib/core). */
export interface VotesView {
  method: string;
  sha256: string;
  sources: { number: number | null; seating: number; sha256: string }[];
  excluded: { number: number | null; cause: string }[];
  disputed: { at: number; values: number[]; chosen: number; support: number; margin: number; standing: "firm" | "weak" | "constructed" | "undecided" }[];
  counts: { firm: number; weak: number; constructed: number; undecided: number; disputed: number };
  odds: { bitErrorRate: string; expectedWrongBitsByMargin: string; leastSureByte: string | null };
  limit: string;
  truncated: boolean;
}

export interface GroupView {
  sha256: string;
  stage: Stage;
  reads: number[];
  seatings: number;
}

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

export interface BoardView {
  id: string;
  role: BoardRole;
  boardNumber: string;
  revision: string | null;
  controllerMarking: string | null;
  motorDriverMarking: string | null;
  condition: string | null;
  /** the unique data lies inside the main controller: there is no chip to move */
  dataInController: boolean;
  fit: { verdict: "fits" | "caution" | "other-number"; differences: string[]; reason: string | null } | null;
  chips: ChipSummary[];
}

/** A photo or document as it is shown: by its reduced copies, never by the original. */
export interface PhotoView {
  id: string;
  of: { type: PhotoSubject; id: string };
  kind: PhotoKind;
  /** of the original, which is kept unchanged */
  sha256: string;
  sizeBytes: number;
  mediaType: string;
  /** as it came */
  fileName: string;
  caption: string | null;
  /** pixels as it is seen, turned the right way up; null for a document */
  width: number | null;
  height: number | null;
  /** the original carries the place where it was taken */
  hadLocation: boolean;
  /** null: the customer, with the request */
  by: PersonView | null;
  storedAt: string;
  /** false: the original is damaged, missing or erased */
  sound: boolean;
  erased?: ErasedView | null;
}

/** One photo on a page of its own, among the others of the same thing. */
export interface PhotoPageView {
  photo: PhotoView;
  /** "Drive A of case 26-0042" */
  place: string;
  crumbs: { label: string; href: string }[];
  back: { label: string; href: string };
  /** ids of the neighbours */
  prev: string | null;
  next: string | null;
  number: number;
  of: number;
}

/** Photos of one thing, with the word for it. */
export interface PhotoGroup {
  of: { type: PhotoSubject; id: string };
  /** "Original board BX 40-3179 rev C" */
  name: string;
  photos: PhotoView[];
}

export interface HandOverView {
  id: string;
  from: { person: string; place: string };
  to: { person: string; place: string };
  /** the receiver's account; they confirm themselves */
  toUserId: string | null;
  condition: string;
  sealNumber: string | null;
  note: string | null;
  givenBy: PersonView;
  givenAt: string;
  confirmed: { received: boolean; by: PersonView; at: string; text: string | null } | null;
}

/** A drive, board or lifted chip: where it is by the last confirmed hand-over, and the one that waits. */
export interface ItemView {
  type: ItemType;
  id: string;
  name: string;
  at: HandOverView | null;
  open: HandOverView | null;
  /** how many hand-overs there were */
  past: number;
}

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

export interface PlacedItem {
  driveId: string;
  item: string;
  handOver: HandOverView;
}

export interface DriveView {
  id: string;
  caseId: string;
  letter: string;
  partNumber: string | null;
  model: string | null;
  serial: string | null;
  interface: string | null;
  capacity: string | null;
  made: string | null;
  firmware: string | null;
  /** null where nobody has said */
  encryption: Encryption | null;
  /** what speaks against the label data, as far as the asker may see the other cases */
  warnings: DriveWarning[];
  boards: BoardView[];
  custodyEntries: number;
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

export interface ListView<T> {
  items: T[];
  total: number;
  page: number;
  pageSize: number;
}

export interface CustodyEntryView {
  seq: number;
  at: string;
  actor: PersonView;
  action: string;
  sentence: string;
  where: string;
  kind: "entry" | "differs" | "signed" | "set-aside";
  hash: string;
  body: string;
  signature: string;
  keyId: string;
}

/** One drive's chain in the list of logs. */
export interface CustodyHeadRow {
  driveId: string;
  letter: string;
  label: string;
  caseId: string;
  caseRef: string;
  entries: number;
  hash: string;
  lastAt: string;
}

export interface CustodyCheckView {
  ok: boolean;
  entries: number;
  head: { seq: number; hash: string };
  findings: { seq: number | null; problem: string; expected?: string; found?: string }[];
}

export interface UserView {
  id: string;
  email: string;
  name: string;
  role: Role;
  disabled: boolean;
  mustChangePassword: boolean;
  lastSeenAt: string | null;
  /** the last day of an auditor's account, year-month-day in the workshop's time zone */
  endsOn: string | null;
  /** that day is over: as good as switched off */
  ended: boolean;
  /** the only cases that this auditor may see, by number; null without a list */
  cases: { id: string; ref: string }[] | null;
}

export interface BenchTokenView {
  id: string;
  name: string;
  createdAt: string;
  lastUsedAt: string | null;
  withdrawnAt: string | null;
}

export interface MailView {
  id: string;
  to: string;
  subject: string;
  /** secret links masked */
  text: string;
  /** the same as mail programs show it */
  html: string;
  /** it may have arrived twice: a server stopped between the receiver's yes and our note of it */
  possibleDuplicate: boolean;
  state: "queued" | "sending" | "sent" | "dead";
  attempts: number;
  queuedAt: string;
  sentAt: string | null;
  lastError: string | null;
}

export interface FindHit {
  readId: string;
  readName: string;
  chipId: string;
  designator: string;
  boardRole: BoardRole;
  caseId: string;
  caseRef: string;
  driveLetter: string;
  crc32: string;
  sha256: string;
  counted: boolean;
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

export interface SessionView {
  /** `cases`: ids of the only cases that a limited auditor may see, so that `may()` answers for the buttons too */
  user: { id: string; name: string; email: string; role: Role; cases?: string[] };
  demo: boolean;
  workshop: string;
  timeZone: string;
  benchCount: number;
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

/** A seal in the list: what it states and why it was made. */
export interface SealRow {
  number: number;
  /** RFC 3339 UTC, as the seal itself says */
  at: string;
  cause: SealCause;
  chains: number;
  root: string;
  prev: string;
  /** SHA-256 of the seal's text */
  sha256: string;
  keyId: string;
}

export interface SealView extends SealRow {
  text: string;
  /** base64 */
  signature: string;
  /** PEM; null when the log introduces no such key */
  key: string | null;
  /** the signature fits the text and the key is one that the log introduces */
  signed: boolean;
}

export interface DriveProofView {
  seal: SealView;
  proof: SealProof;
}

export interface KeyRow {
  keyId: string;
  purpose: KeyPurpose;
  /** RFC 3339 UTC, when the log introduced it */
  since: string;
  introducedBy: PersonView;
  reason: string | null;
  current: boolean;
}

export interface WitnessView {
  path: string;
  /** the highest seal number in the file; null when it holds none */
  last: number | null;
  /** a sentence about what is wrong; null when nothing is */
  trouble: string | null;
}

/** A stored image that is damaged or gone, and what it is kept as. */
export interface FaultyImageView {
  sha256: string;
  state: "damaged" | "missing";
  sizeBytes: number;
  /** RFC 3339, when it was last read whole */
  checkedAt: string | null;
  uses: { caseId: string | null; caseRef: string | null; driveId: string | null; chipId: string | null; name: string }[];
}

/** How the stored images are and how far reading them again has come. A limited auditor's numbers are of their cases. */
export interface ScrubView {
  images: number;
  bytes: number;
  states: { sound: number; damaged: number; missing: number };
  /** not read again since they were stored */
  neverChecked: number;
  /** RFC 3339: when the image verified longest ago was verified, at its storing or since; null without images */
  oldestAt: string | null;
  /** the image read last, and when */
  last: { sha256: string; at: string } | null;
  /** each image is read again within so many days; 0: switched off */
  days: number;
  mebibytesPerSecond: number;
  /** hours that one reading of the whole store takes at that pace */
  hours: number;
  state: "off" | "keeping-up" | "behind" | "stopped";
  /** that state as one plain sentence */
  sentence: string;
  /** what is being read now */
  now: { driveId: string | null; sha256: string } | null;
  faulty: FaultyImageView[];
}

/** The parcel as it came. */
export interface ReceiptView {
  carrier: string | null;
  tracking: string | null;
  sealAsSent: AsSent;
  sealNumber: string | null;
  smallBoard: AsSent;
  parcelCondition: string;
  accessories: string | null;
  /** what is not as the request said; null when all is */
  differs: string | null;
  by: PersonView;
  at: string;
}

/** A case that was asked for and whose parcel is not here yet. */
export interface ToReceiveRow {
  caseId: string;
  caseRef: string;
  customerName: string;
  damage: string;
  dueOn: string | null;
  /** the day by which the customer needs it, as they typed it */
  neededBy: string | null;
  /** part number, model or serial number, as the customer gave it */
  partNumber: string | null;
  requestedAt: string;
}

/** What the customer said would be in the parcel. */
export interface ParcelView {
  caseId: string;
  caseRef: string;
  refChecked: string;
  customerName: string;
  damage: string;
  note: string | null;
  requestedAt: string | null;
  receivedAt: string | null;
  closed: boolean;
  asked: AskedDrive;
  /** a word of lib/core/request-words.ts; null for a case made at the desk */
  enclosure: string | null;
  boardHidden: boolean;
  dueOn: string | null;
  /** the day by which the customer needs it, as they typed it */
  neededBy: string | null;
}

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

/** The customer's private page. */
export interface RequestPageView {
  workshop: string;
  /** lines of the workshop's address; may be empty */
  address: string[];
  hours: string | null;
  contact: { email: string | null; phone: string | null };
  refChecked: string;
  state: RequestState;
  answers: RequestAnswers;
  /** how many the customer sent */
  photos: number;
  requestedAt: string;
  receivedAt: string | null;
  /** the slip is still of use */
  slip: boolean;
  /** the request can still be taken back */
  withdraws: boolean;
  deletion: { askedAt: string; answerBy: string; answered: { at: string; answer: string | null } | null } | null;
  /** when the images were erased */
  erasedAt: string | null;
  summarySentAt: string | null;
  /** when this page ends, once that is known */
  ends: string | null;
}

/** The page that travels with the board. */
export interface RequestSlipView {
  workshop: string;
  address: string[];
  hours: string | null;
  refChecked: string;
  answers: RequestAnswers;
}

/** A request as the desk sees it on its case. */
export interface RequestSectionView {
  id: string;
  answers: RequestAnswers;
  requestedAt: string;
  /** the sentence that the customer's page shows */
  shown: string;
  closed: boolean;
  link: { ends: string | null; works: boolean };
  deletion: { askedAt: string; answerBy: string; daysLeft: number; message: string | null; answered: { at: string; by: string; answer: string | null } | null } | null;
}

export interface StartUpView extends StartUpFacts {
  id: string;
  note: string | null;
  by: PersonView;
  at: string;
}

export interface DriveStartUps {
  driveId: string;
  /** newest first */
  tests: StartUpView[];
  /** why it may not be started yet */
  refusal: string | null;
  /** serial on the label */
  label: string | null;
  /** the case is closed */
  closed: boolean;
}

export interface ReturnView {
  items: string[];
  toPerson: string;
  carrier: string | null;
  tracking: string | null;
  sealNumber: string | null;
  note: string | null;
  by: PersonView;
  at: string;
}

/** The end of a case: tests, what goes back, how it was closed. */
export interface ClosingView {
  facts: ClosingFacts;
  /** the latest test of each drive, and why it may not be started yet */
  drives: { id: string; letter: string; test: StartUpFacts | null; refusal: string | null; /** its own data lies inside the main controller */ noChip: boolean }[];
  /** what could go back */
  items: string[];
  customerName: string;
  returned: ReturnView | null;
  closed: { at: string; kind: ClosedKind | null; reason: string | null } | null;
  /** calendar day of the workshop; set when the case is closed */
  eraseOn: string | null;
  /** how many days images are kept after the return, as the customer was told */
  keepDays: number;
}

/** One image that an erasure is about, by what it is kept as in this case. */
export interface ErasureItemView {
  sha256: string;
  sizeBytes: number;
  names: string[];
}

/** What is stored of a closed case, how long yet, and what an erasure would take or took. */
export interface ErasureView {
  caseId: string;
  caseRef: string;
  /** calendar days of the workshop */
  eraseOn: string | null;
  kept: { until: string; reason: string } | null;
  due: boolean;
  /** why the images can't be erased now; null when they can */
  refusal: string | null;
  /** the images of reads, then the photos and documents */
  goes: ErasureItemView[];
  bytes: number;
  photos: number;
  /** used elsewhere too; `also` names where */
  stays: (ErasureItemView & { also: string[] })[];
  /** chips that need transfer and were never verified: their images may be the only copy */
  unverified: string[];
  wish: { requestId: string; askedAt: string; answeredAt: string | null } | null;
  /** the newest first */
  erasures: { id: string; at: string; by: PersonView; cause: EraseCause; reason: string; images: number; photos: number; bytes: number; erased: ErasureItemView[]; kept: ErasureItemView[] }[];
}
