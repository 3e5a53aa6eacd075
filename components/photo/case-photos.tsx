import Link from "next/link";
import { countOf } from "@/lib/core/quantity";
import type { PhotoView } from "@/lib/views";
import { Photos } from "./photos";

/** Photos of the case itself (the parcel, papers, what came along), and where those of its drives are. */
export function CasePhotos({ caseId, caseRef, photos, drives, adds, timeZone }: {
  caseId: string;
  caseRef: string;
  photos: readonly PhotoView[];
  drives: readonly { id: string; letter: string; photos: number }[];
  adds: boolean;
  timeZone: string;
}) {
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-4">
      <Photos of={{ type: "case", id: caseId }} name={`case ${caseRef}`} photos={photos} adds={adds} timeZone={timeZone} />
      {drives.length > 0 ? (
        <p className="flex flex-wrap gap-x-5 gap-y-1 text-t2">
          {drives.map((drive) => <Link key={drive.id} href={`/drives/${drive.id}#photos`}>Drive {drive.letter} and its boards: {drive.photos === 0 ? "no photo yet" : countOf(drive.photos, "photo")}</Link>)}
        </p>
      ) : null}
    </div>
  );
}
