import type { ReactNode } from "react";

/** The board goes on below its edge on pages about chips; its 4 px bare edge ends it, then the paper starts. `label` names the region. */
export function BoardPanel({ label, children, className = "" }: { label: string; children: ReactNode; className?: string }) {
  return <section aria-label={label} className="board"><div className={`mx-auto max-w-[1440px] px-8 grand:max-w-[1680px] phone:px-4 print:max-w-none print:p-0 ${className}`}>{children}</div></section>;
}
