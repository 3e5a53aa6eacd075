/** Boxes for single characters, filled or to be filled by hand. */
export function Comb({ text = "", length, gapAfter }: { text?: string; length: number; gapAfter?: number }) {
  return (
    <span className="comb" aria-label={text || `${length} boxes to fill in`} role="img">
      {Array.from({ length }, (_, i) => <i key={i} className={gapAfter === i ? "gap" : ""}>{text[i]}</i>)}
    </span>
  );
}
