import Image from "next/image";
import Link from "next/link";
import { Digest } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { momentText } from "@/components/ui/times";
import type { PhotoSubject } from "@/lib/core/words";
import type { PhotoGroup, PhotoView } from "@/lib/views";
import { AddPhotos } from "./add-photos";
import { adderOf, fileSize, originalSrc, thumbSrc, titleOf, typeName } from "./photo-words";

export interface PhotosProps {
  of: { type: PhotoSubject; id: string };
  /** "Drive A", "U12": for labels */
  name: string;
  photos: readonly PhotoView[];
  /** this person may add some now */
  adds: boolean;
  timeZone: string;
}

/** The photos and documents of one thing, and a place to add more. */
export function Photos({ of, name, photos, adds, timeZone }: PhotosProps) {
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-4">
      {photos.length > 0 ? (
        <ul className="photo-grid" aria-label={`Photos of ${name}`}>{photos.map((photo) => <PhotoCard key={photo.id} photo={photo} timeZone={timeZone} />)}</ul>
      ) : <p className="text-ink-2">No photo of {name} yet.</p>}
      {adds ? <AddPhotos of={of} name={name} /> : null}
    </div>
  );
}

/** Several things under each other, each with its name; those without photos only where some can be added. */
export function PhotoGroups({ groups, adds, timeZone }: { groups: readonly PhotoGroup[]; adds: boolean; timeZone: string }) {
  const shown = groups.filter((group) => adds || group.photos.length > 0);
  if (shown.length === 0) return <p className="text-ink-2">No photo yet.</p>;
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-7">
      {shown.map(({ of, name, photos }) => (
        <section key={of.id} aria-label={`Photos of ${name}`} className="grid grid-cols-[minmax(0,1fr)] gap-2.5">
          <h3 className="text-t3 font-bold">{name}</h3>
          <Photos of={of} name={name} photos={photos} adds={adds} timeZone={timeZone} />
        </section>
      ))}
    </div>
  );
}

function PhotoCard({ photo, timeZone }: { photo: PhotoView; timeZone: string }) {
  const title = titleOf(photo);
  return (
    <li>
      <figure className="photo-card">
        {photo.erased ? <span className="mat erased">Erased</span> : photo.kind === "photo" ? (
          <Link href={`/photos/${photo.id}`} className="mat" aria-label={`${title}, larger`} prefetch={false}>
            <Image src={thumbSrc(photo)} alt="" width={400} height={300} unoptimized loading="lazy" />
          </Link>
        ) : (
          <a href={originalSrc(photo)} className="mat" download aria-label={`${title}, ${typeName(photo)}, ${fileSize(photo.sizeBytes)}: download`}><Sheet type={typeName(photo)} /></a>
        )}
        <figcaption>
          <b className="photo-title">{title}</b>
          {photo.caption && photo.fileName ? <span className="photo-file">{photo.fileName}</span> : null}
          <span>{adderOf(photo)}, {momentText(photo.storedAt, timeZone)}</span>
          <span className="photo-digest"><span>SHA-256</span><Digest sha256={photo.sha256} /></span>
          {photo.kind === "document" ? <span>{typeName(photo)}, {fileSize(photo.sizeBytes)}</span> : null}
          {photo.hadLocation ? <span>The original says where it was taken; what is shown here doesn’t.</span> : null}
          {photo.erased ? <FindingLine kind="aside">{photo.erased.text}</FindingLine> : photo.sound ? null : <FindingLine kind="block">The stored original is damaged or missing. Send the same file once more.</FindingLine>}
        </figcaption>
      </figure>
    </li>
  );
}

/** A document as we draw one: a sheet with a folded corner and the name of its kind. */
function Sheet({ type }: { type: string }) {
  return (
    <svg viewBox="0 0 72 92" width="72" height="92" aria-hidden="true">
      <path d="M2 2h46l22 22v66H2z" fill="var(--sheet)" stroke="var(--ink-2)" strokeWidth="2" />
      <path d="M48 2v22h22" fill="none" stroke="var(--ink-2)" strokeWidth="2" />
      <path d="M14 40h44M14 50h44M14 60h30" stroke="var(--rule-2)" strokeWidth="3" />
      <text x="14" y="81" fontSize="15" fontWeight="700" fill="var(--ink)" fontFamily="var(--mono)">{type}</text>
    </svg>
  );
}
