import type { ErasedView, PhotoView } from "@/lib/views";
import type { Photo } from "@/models";
import type { People } from "./people";

export function photoView(row: Photo, who: People, sound: boolean, erased: ErasedView | null = null): PhotoView {
  return {
    id: row.id, of: { type: row.subjectType, id: row.subjectId }, kind: row.kind, sha256: row.sha256.toString("hex"), sizeBytes: row.sizeBytes, mediaType: row.mediaType,
    fileName: row.fileName, caption: row.caption ?? null, width: row.width ?? null, height: row.height ?? null, hadLocation: Boolean(row.hadLocation),
    by: row.byUserId ? who(row.byUserId) : null, storedAt: row.storedAt.toISOString(), sound, erased,
  };
}
