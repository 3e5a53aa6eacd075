import type { PhotoKind, PhotoSubject } from "@/lib/core/words";
import type { PersonView } from "./person";
import type { ErasedView } from "./read";

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
