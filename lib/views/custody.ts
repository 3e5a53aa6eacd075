import type { SealRow } from "@/lib/core/audit-rows";
import type { SealProof } from "@/lib/core/seal";
import type { KeyPurpose } from "@/lib/core/words";
import type { PersonView } from "./person";

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

export type { SealRow };

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
