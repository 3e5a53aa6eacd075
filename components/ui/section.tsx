import type { ReactNode } from "react";

/** A part of the form: hairline above, title in the left margin. `wide` takes the full width under 1400 px (strips). */
export function Section({ title, note, aside, id, wide, strong, first, children }: {
  title: ReactNode;
  note?: ReactNode;
  /** stands below the note in the margin (legend, side facts) */
  aside?: ReactNode;
  id?: string;
  wide?: boolean;
  /** double rule: around the decision only */
  strong?: boolean;
  /** no rule above */
  first?: boolean;
  children: ReactNode;
}) {
  const rule = strong ? "border-t-[3px] border-double border-rule-2" : first ? "" : "border-t border-rule";
  const columns = `grid-cols-[var(--margin-col)_minmax(0,1fr)] narrow:grid-cols-[minmax(0,1fr)] ${wide ? "mid:grid-cols-[minmax(0,1fr)] mid:gap-y-3.5" : ""}`;
  return (
    <section id={id} className={`grid gap-x-6 pt-[22px] pb-[26px] narrow:gap-y-3.5 print:block print:py-2.5 ${columns} ${rule}`}>
      <div className="print:pb-2 print:break-after-avoid">
        <h2 className="text-t4 leading-[1.375rem] font-bold">{title}</h2>
        {note ? <p className="mt-1 text-t2 text-ink-2">{note}</p> : null}
        {aside}
      </div>
      <div className="min-w-0">{children}</div>
    </section>
  );
}

/** The page's width and sides. */
export function Wrap({ children, className = "" }: { children: ReactNode; className?: string }) {
  return <div className={`mx-auto max-w-[1440px] px-8 grand:max-w-[1680px] phone:px-4 print:max-w-none print:p-0 ${className}`}>{children}</div>;
}

export function PageTitle({ children, note }: { children: ReactNode; note?: ReactNode }) {
  return (
    <div className="pt-6 pb-5">
      <h1 className="text-t7 font-bold tracking-[-0.012em] phone:text-[1.625rem] phone:leading-8">{children}</h1>
      {note ? <p className="mt-1 text-ink-2">{note}</p> : null}
    </div>
  );
}
