import type { ReactNode } from "react";
import { Mark } from "./mark";

export type NoteKind = "block" | "caution" | "note" | "ok";

const GROUND: Record<NoteKind, string> = {
  block: "bg-block-wash ring-1 ring-block ring-inset [--hole:var(--block-wash)]",
  caution: "bg-caution-wash [--hole:var(--caution-wash)] print:border",
  note: "bg-note-wash [--hole:var(--note-wash)] print:border",
  ok: "bg-green-wash [--hole:var(--green-wash)] print:border",
};
const WORD: Record<NoteKind, string> = { block: "Stands in the way", caution: "Caution", note: "Note", ok: "In order" };

/** Wash ground, mark, bold first sentence. Pass `role="alert"` for an error that arose here. */
export function Note({ kind = "note", title, children, role, className = "" }: { kind?: NoteKind; title?: ReactNode; children?: ReactNode; role?: "alert" | "status"; className?: string }) {
  return (
    <div role={role} className={`grid grid-cols-[16px_minmax(0,1fr)] gap-2.5 px-3 py-2.5 forced-colors:border ${GROUND[kind]} ${className}`}>
      <Mark kind={kind} label={WORD[kind]} className="mt-0.5" />
      <div>
        {title ? <b className="block">{title}</b> : null}
        {children}
      </div>
    </div>
  );
}
