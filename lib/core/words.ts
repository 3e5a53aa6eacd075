/** The words of the product: every closed list that URL, table, type and screen share. */

export const ROLES = ["technician", "lead", "auditor", "admin"] as const;
export type Role = (typeof ROLES)[number];

/** Whoever acts. `system` is Twinread itself (judgements, revocations by a rule). */
export interface Actor {
  id: string;
  name: string;
  role: Role | "system";
  /** ids of the only cases that this auditor may see; left out where the account carries no list */
  cases?: readonly string[];
}

/** The nil UUID: Twinread as an actor, and the chain `workshop`. */
export const NIL = "00000000-0000-0000-0000-000000000000";
export const SYSTEM: Actor = { id: NIL, name: "Twinread", role: "system" };
export const WORKSHOP_CHAIN = NIL;

export const BOARD_ROLES = ["original", "donor"] as const;
export type BoardRole = (typeof BOARD_ROLES)[number];

export const STAGES = ["before", "donor", "after"] as const;
export type Stage = (typeof STAGES)[number];

export const BUSES = ["spi", "i2c", "microwire", "other"] as const;
export type Bus = (typeof BUSES)[number];

export const SIZE_SOURCES = ["marking", "id", "sfdp", "typed"] as const;
export type SizeSource = (typeof SIZE_SOURCES)[number];

export const METHODS = ["in-place", "lifted", "socket"] as const;
export type Method = (typeof METHODS)[number];

export const FORMATS = ["raw", "intel-hex", "s-record"] as const;
export type Format = (typeof FORMATS)[number];

export const TRANSFER_KINDS = ["write", "chip-moved"] as const;
export type TransferKind = (typeof TRANSFER_KINDS)[number];

/** Why a seal was made: the day's own, before a bundle or a summary left, or because somebody asked. */
export const SEAL_CAUSES = ["daily", "bundle", "summary", "asked"] as const;
export type SealCause = (typeof SEAL_CAUSES)[number];

/** What a hand-over moves from person to person and place to place. */
export const ITEM_TYPES = ["drive", "board", "chip"] as const;
export type ItemType = (typeof ITEM_TYPES)[number];

export const KEY_PURPOSES = ["log", "seal"] as const;
export type KeyPurpose = (typeof KEY_PURPOSES)[number];

/** Answers at the desk: as it was sent, not so, or there is none. */
export const AS_SENT = ["yes", "no", "none"] as const;
export type AsSent = (typeof AS_SENT)[number];

/** Whom or what a case waits for. */
export const WAITING_FOR = ["customer", "donor", "parts", "workshop", "other"] as const;
export type WaitingFor = (typeof WAITING_FOR)[number];

export const CLOSED_KINDS = ["returned", "without-transfer", "cancelled"] as const;
export type ClosedKind = (typeof CLOSED_KINDS)[number];

/** why a case's images were erased: their day had come, or the customer asked for it */
export const ERASE_CAUSES = ["due", "asked-for"] as const;
export type EraseCause = (typeof ERASE_CAUSES)[number];

export const ENCRYPTIONS = ["none", "suspected", "yes"] as const;
export type Encryption = (typeof ENCRYPTIONS)[number];

export const PHOTO_SUBJECTS = ["case", "drive", "board", "chip", "shelf-board"] as const;
export type PhotoSubject = (typeof PHOTO_SUBJECTS)[number];

export const PHOTO_KINDS = ["photo", "document"] as const;
export type PhotoKind = (typeof PHOTO_KINDS)[number];

/** What happened to the drive, as the public form asks it. */
export const DAMAGES = ["power-surge", "wrong-supply", "liquid", "connector", "just-stopped", "unknown"] as const;
export type Damage = (typeof DAMAGES)[number];

export const SEVERITIES = ["blocks", "reason", "note"] as const;
export type Severity = (typeof SEVERITIES)[number];

/** States of a chip in the order in which PRODUCT.md asks them; the first that applies is the state. */
export const CHIP_STATES = [
  "verified", "failed", "written", "approved", "unread", "reads-disagree", "held", "needs-reads", "ready",
] as const;
export type ChipStateCode = (typeof CHIP_STATES)[number];

/** What a rule or comparison found. `ranges` are byte offsets from the start of the image. */
export interface Range {
  start: number;
  length: number;
}

export interface Finding {
  code: FindingCode;
  severity: Severity;
  /** One plain sentence: what was found. */
  message: string;
  /** What to do next at the bench. */
  advice: string;
  measured?: string;
  threshold?: string;
  ranges?: Range[];
}

export const FINDING_CODES = [
  // one image by itself
  "blank", "all-zero", "constant", "nearly-blank", "repeats-within", "address-line", "short-period", "too-short", "padded", "extra-bytes",
  "bit-slip", "text-file", "container-file", "noise-like", "constant-bit", "size-contradicts", "size-not-power-of-two",
  // against what else is on record
  "other-chip", "other-drive", "donor-content", "family-likeness", "copy-not-a-read", "one-seating",
  // two reads, or a read-back and what should have been written
  "byte-slip", "command-echo", "rotated", "byte-swapped", "bit-reversed", "inverted", "rearranged", "lost-contact", "random-flips",
  "one-way-flips", "foreign-blocks", "buffer-edge", "edge-bytes",
  // a composite
  "derived", "weak-bytes", "constructed-bytes",
  // after a write
  "verified", "write-refused", "not-erased", "erased-only", "page-wrap", "partly-protected", "weak-cells", "other-image", "differs",
] as const;
export type FindingCode = (typeof FINDING_CODES)[number];

export interface Policy {
  /** agreeing reads needed for an approval, at least 2 */
  reads: number;
  /** seatings among them, at least 1 */
  seatings: number;
  /** equal read-backs needed for a verified transfer, at least 1 */
  readBacks: number;
  readBackSeatings: number;
  twoPersonRule: boolean;
  secondFactor: boolean;
  /** days until a customer's link expires */
  shareDays: number;
  /** days until a returned case's images fall due for erasure */
  erasureDays: number;
}

export const DEFAULT_POLICY: Policy = {
  reads: 3, seatings: 2, readBacks: 2, readBackSeatings: 2,
  twoPersonRule: true, secondFactor: false, shareDays: 90, erasureDays: 90,
};

const STAGE_NAME: Record<Stage, string> = { before: "Read", donor: "Own", after: "Back" };

/** `readName("donor", 2)` is "Own 2". */
export function readName(stage: Stage, number: number): string {
  return `${STAGE_NAME[stage]} ${number}`;
}

/** Seating 1 is "A", 26 is "Z", 27 is "AA". */
export function seatingLetter(seating: number): string {
  let n = seating;
  let out = "";
  while (n > 0) {
    n -= 1;
    out = String.fromCharCode(65 + (n % 26)) + out;
    n = Math.floor(n / 26);
  }
  return out;
}
