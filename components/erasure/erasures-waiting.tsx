import Link from "next/link";
import { Note } from "@/components/ui/note";
import { dayYearText } from "@/components/ui/times";
import { countOf } from "@/lib/core/quantity";

/** On the bench of a lead or admin: what is due for erasure, and which customers wait for an answer. Nothing where nothing is. */
export function ErasuresWaiting({ waiting, timeZone }: { waiting: { due: number; wishes: { caseId: string; caseRef: string; askedAt: string }[] } | null; timeZone: string }) {
  if (!waiting || (waiting.due === 0 && waiting.wishes.length === 0)) return null;
  const { due, wishes } = waiting;
  return (
    <div className="no-print grid gap-3 pt-4">
      {wishes.length > 0 ? (
        <Note kind="caution" title={wishes.length === 1 ? "A customer asks for deletion." : `${wishes.length} customers ask for deletion.`}>
          Answer {wishes.length === 1 ? "it" : "them"}: {wishes.map((one, i) => <span key={one.caseId}>{i > 0 ? ", " : ""}<Link href={`/cases/${one.caseId}#request`}>{one.caseRef}</Link>, asked on {dayYearText(one.askedAt, timeZone)}</span>)}.
        </Note>
      ) : null}
      {due > 0 ? <Note kind="note" title={`The images of ${countOf(due, "closed case")} are due for erasure.`}>Nothing is erased by itself: <Link href="/cases?state=erasure-due">look at {due === 1 ? "it" : "them"}</Link>, then erase, or keep longer with a reason.</Note> : null}
    </div>
  );
}
