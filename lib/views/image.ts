import type { EraseCause } from "@/lib/core/words";
import type { PersonView } from "./person";

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
