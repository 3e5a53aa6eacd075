import { LaneSvg, StripSvg } from "./strip-svg";

const ENTRIES = [
  ["d", "dense, packed"], ["o", "ordinary data"], ["t", "text-like"], ["z", "zeros (00)"], ["b", "blank (FF)"], ["n", "not read"],
] as const;

export function StripLegend() {
  return (
    <ul className="legend">
      {ENTRIES.map(([letter, word]) => <li key={letter}><span className="swatch"><StripSvg cells={letter.repeat(8)} height={18} /></span>{word}</li>)}
      <li><span className="swatch swatch-lane"><LaneSvg counts={[0, 0, 0, 8, 64, 200, 0, 0]} length={8} height={18} /></span>bytes differ</li>
    </ul>
  );
}
