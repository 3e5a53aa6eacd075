import Image from "next/image";
import Link from "next/link";
import { buttonClass, ButtonLink, Buttons } from "@/components/ui/button";
import { DigestInFull } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { Icon } from "@/components/ui/icon";
import { exactText } from "@/components/ui/times";
import { withCommas } from "@/lib/core/quantity";
import type { PhotoPageView } from "@/lib/views";
import { PhotoKeys } from "./photo-keys";
import { adderOf, fileSize, originalSrc, pageSrc, titleOf, typeName } from "./photo-words";

/** One photo as large as the page, in a neutral mat, with what is known of it. */
export function PhotoSheet({ view, timeZone }: { view: PhotoPageView; timeZone: string }) {
  const { photo, prev, next, number, of } = view;
  const [width, height] = [photo.width ?? 4, photo.height ?? 3];
  const scale = Math.min(1, 1600 / Math.max(width, height));
  // as large as the window lets it be, and known before its bytes are here: nothing below it moves
  const room = { width: `min(100%, ${Math.round(width * scale)}px, ${((76 * width) / height).toFixed(1)}vh)` };
  const facts: [string, React.ReactNode][] = [
    ["File", <span key="file" className="font-mono text-t2 [overflow-wrap:anywhere]">{photo.fileName || "without a name"}</span>],
    ["Added by", `${adderOf(photo)}, ${exactText(photo.storedAt, timeZone)}`],
    ["Original", `${typeName(photo)}, ${photo.width === null ? "" : `${withCommas(width)} by ${withCommas(height)} pixels, `}${fileSize(photo.sizeBytes)}`],
    ["SHA-256", <DigestInFull key="sha" sha256={photo.sha256} className="text-t2" />],
    ["Place", photo.hadLocation ? "The original says where it was taken. The copy shown here doesn’t; a download does." : "The original does not say where it was taken."],
  ];
  return (
    <>
      <PhotoKeys prev={prev} next={next} />
      {photo.erased ? <p className="border border-dashed border-rule-2 px-5 py-8 text-ink-2">{photo.erased.text}</p> : photo.kind === "photo" ? (
        <div className="mat mat-large"><Image src={pageSrc(photo)} alt={titleOf(photo)} width={Math.round(width * scale)} height={Math.round(height * scale)} style={room} unoptimized priority /></div>
      ) : <p className="border border-dashed border-rule-2 px-5 py-8 text-ink-2">A document is not shown here. Download it and open it with a program that you trust.</p>}
      <div className="flex flex-wrap items-start justify-between gap-x-8 gap-y-4 pt-4">
        <dl className="photo-facts">{facts.map(([name, value]) => <div key={name}><dt>{name}</dt><dd>{value}</dd></div>)}</dl>
        <Buttons>
          {prev ? <ButtonLink href={`/photos/${prev}`} replace><Icon name="prev" /> Previous</ButtonLink> : null}
          {of > 1 ? <span className="text-t2 text-ink-2">{number} of {of}</span> : null}
          {next ? <ButtonLink href={`/photos/${next}`} replace>Next <Icon name="next" /></ButtonLink> : null}
          {photo.erased ? null : <a href={originalSrc(photo)} download className={buttonClass({})}><Icon name="down" /> Download the original</a>}
        </Buttons>
      </div>
      {photo.erased || photo.sound ? null : <div className="pt-3"><FindingLine kind="block">The stored original is damaged or missing: what is shown is a copy made before. Send the same file once more, or restore it from a backup.</FindingLine></div>}
      <p className="pt-3 pb-6 text-t2 text-ink-2"><Link href={view.back.href}>Back to {view.back.label}</Link></p>
    </>
  );
}
