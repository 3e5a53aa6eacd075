import type { CSSProperties, ReactNode } from "react";
import { type PaperName, PAPERS } from "@/lib/core/paper";
import { Qr } from "./qr";

/** Millimetres left white. Labels are printed to the edge by machines that know their own. */
const MARGIN: Record<PaperName, number> = { a4: 12, a5: 9, a6: 6, "62x29": 1.6, "70x37": 1.8 };

/** The page's size for the printer: one paper to a page. Sheets that flow over several pages have their white from here. */
export function PaperRule({ paper, flows }: { paper: PaperName; flows?: boolean }) {
  const { width, height } = PAPERS[paper];
  // a sheet that is exactly its paper has no room for a foot, and says itself what it is
  const foot = flows ? "" : "@bottom-left { content: none; } @bottom-right { content: none; }";
  return <style>{`@page { size: ${width}mm ${height}mm; margin: ${flows ? MARGIN[paper] : 0}mm; ${foot} }`}</style>;
}

/** One sheet. A fixed one is exactly its paper and takes what its values' rules let in; one that flows goes on over pages. */
export function Sheet({ paper, flows, label, children }: { paper: PaperName; flows?: boolean; label: string; children: ReactNode }) {
  const { width, height } = PAPERS[paper];
  return (
    <section aria-label={label} data-paper={paper} className={`printed ${flows ? "" : "exact"}`} style={{ "--w": `${width}mm`, "--h": `${height}mm`, "--m": `${MARGIN[paper]}mm` } as CSSProperties}>
      {children}
    </section>
  );
}

/** Millimetres of a sheet that are not margin. */
export const insideOf = (paper: PaperName) => ({ width: PAPERS[paper].width - 2 * MARGIN[paper], height: PAPERS[paper].height - 2 * MARGIN[paper] });

/** Title at the left, the case number with its square code at the right. */
export function PrintHead({ workshop, title, refChecked, code = "22mm", note }: { workshop: string; title: string; refChecked: string; code?: string; note?: ReactNode }) {
  return (
    <header className="print-head">
      <div className="min-w-0">
        <p>{workshop}</p>
        <h1>{title}</h1>
        {note ? <p className="cap">{note}</p> : null}
      </div>
      <div className="number">
        <div><span className="cap">Case</span><b>{refChecked}</b></div>
        <Qr text={refChecked} size={code} />
      </div>
    </header>
  );
}

/** A box of the ruled form; an empty one leaves room for a hand. */
export function Fact({ name, wide = "", children }: { name: string; wide?: "w12" | "w8" | "w6" | "w3" | ""; children?: ReactNode }) {
  return <div className={`${wide} ${children ? "" : "room"}`}><dt>{name}</dt><dd>{children}</dd></div>;
}
