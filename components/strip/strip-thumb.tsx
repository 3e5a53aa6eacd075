import type { ChipSummary } from "@/lib/views";
import { LaneSvg, StripSvg } from "./strip-svg";

const TWO = { reads: "Two images that differ", "read-back": "The approved image, and a read-back that differs from it" };

/** 64 cells on 128 px: one image, or two and the lane between them. A dotted line when nothing is read yet. */
export function StripThumb({ thumbnail }: { thumbnail: ChipSummary["thumbnail"] }) {
  const [first, second] = thumbnail.images;
  if (!first) return <span className="thumb block h-3 border-b-2 border-dotted border-rule-2"><span className="sr-only">No read yet</span></span>;
  return (
    <span className="thumb block">
      <span className="sr-only">{second ? TWO[thumbnail.shows] : "One image"}</span>
      <StripSvg cells={first} height={12} className="strip-mini" />
      {second ? <><LaneSvg counts={thumbnail.lane} length={first.length} height={8} className="lane-mini" /><StripSvg cells={second} height={12} className="strip-mini" /></> : null}
    </span>
  );
}
