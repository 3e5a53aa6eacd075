import type { ReactNode } from "react";

/** What will be here, and the first step. */
export function Empty({ title, children, action }: { title: ReactNode; children?: ReactNode; action?: ReactNode }) {
  return (
    <div className="max-w-[76ch] border border-dashed border-rule-2 px-5 py-[18px] text-ink-2">
      <b className="block text-t4 text-ink">{title}</b>
      {children}
      {action ? <div className="no-print mt-3">{action}</div> : null}
    </div>
  );
}
