import type { ReactNode } from "react";
import { Mark, type MarkKind } from "./mark";

/** Mark and one plain clause; several stack. Never a bare code. */
export function FindingLine({ kind, children }: { kind: MarkKind; children: ReactNode }) {
  return <span className="mt-1 flex items-start gap-2 first:mt-0"><Mark kind={kind} className="mt-0.5 [--hole:var(--paper)]" /><span>{children}</span></span>;
}
