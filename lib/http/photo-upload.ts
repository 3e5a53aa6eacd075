import { addPhotos, type PhotoFile, requirePhotoPlace } from "@/lib/commands/add-photos";
import type { PhotoSubject } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { photosOf } from "@/lib/queries/photos";
import { handler } from "./handler";
import { PHOTOS, type Upload } from "./upload";
import { uploadHandler } from "./upload-handler";

/** The files of a call with their captions: none, or one field `caption` for each file in their order. */
export function photoFilesOf(upload: Upload): PhotoFile[] {
  const captions = upload.fields.get("caption") ?? [];
  if (captions.length > 0 && captions.length !== upload.files.length) {
    throw new AppError("does-not-fit", `Give a caption for every file or for none: ${upload.files.length} files came with ${captions.length}.`, { errors: [{ path: "caption", message: "One a file, or none." }] });
  }
  return upload.files.map((file, i) => ({ ...file, caption: captions[i] ?? null }));
}

/** The photos of a thing, for the routes of each kind of thing. */
export const photoList = (type: PhotoSubject) => handler({}, async ({ actor, params }) => ({ photos: await photosOf(actor, type, params.id) }));

/** More of them: who may is asked before any byte is taken. */
export const photoUpload = (type: PhotoSubject) => uploadHandler(
  { status: 201, changes: true, limits: PHOTOS, before: async (actor, id) => void (await requirePhotoPlace(actor, type, id)) },
  ({ actor, id, upload }) => addPhotos(actor, type, id, photoFilesOf(upload)),
);
