import { TYPE_NAME, type PhotoType } from "@/lib/core/photo-kind";
import type { PhotoSubject } from "@/lib/core/words";
import type { PhotoView } from "@/lib/views";

export const FOLDER: Record<PhotoSubject, string> = { case: "cases", drive: "drives", board: "boards", chip: "chips", "shelf-board": "shelf-boards" };

export const originalSrc = (photo: Pick<PhotoView, "id">) => `/api/photos/${photo.id}`;
export const pageSrc = (photo: Pick<PhotoView, "id">) => `/api/photos/${photo.id}?reduced=1600`;
export const thumbSrc = (photo: Pick<PhotoView, "id">) => `/api/photos/${photo.id}?reduced=400`;

/** What it is called on a page: its caption, else the name of its file. */
export function titleOf({ caption, fileName, kind }: Pick<PhotoView, "caption" | "fileName" | "kind">): string {
  return caption ?? (fileName.trim() || (kind === "photo" ? "Photo without a name" : "Document without a name"));
}

export const typeName = (photo: Pick<PhotoView, "mediaType">) => TYPE_NAME[photo.mediaType as PhotoType] ?? photo.mediaType;

export const adderOf = (photo: Pick<PhotoView, "by">) => photo.by?.name ?? "the customer, with the request";

/** "3.4 MiB", "812 KiB": how large a file is, for a person. */
export function fileSize(bytes: number): string {
  if (bytes < 1024) return `${bytes} bytes`;
  const [value, unit] = bytes < 1024 * 1024 ? [bytes / 1024, "KiB"] : [bytes / 1024 / 1024, "MiB"];
  return `${value < 9.95 ? value.toFixed(1) : Math.round(value)} ${unit}`;
}
