import { countOf, sizeText } from "@/lib/core/quantity";
import type { EraseCause } from "@/lib/core/words";

/** "6 images and 4 photos or documents, 3 MiB" */
export function amountText({ images, photos, bytes }: { images: number; photos: number; bytes: number }): string {
  const parts = [...(images > 0 || photos === 0 ? [countOf(images, "image")] : []), ...(photos > 0 ? [`${photos} ${photos === 1 ? "photo or document" : "photos and documents"}`] : [])];
  return `${parts.join(" and ")}, ${sizeText(bytes)}`;
}

export const CAUSE_WORDS: Record<EraseCause, string> = { due: "its day had come", "asked-for": "the customer asked for it" };
