import { Note as NoteBox } from "@/components/ui/note";
import { Section } from "@/components/ui/section";
import { momentText } from "@/components/ui/times";
import { may } from "@/lib/core/policy";
import type { CaseView, NoteView, SessionView } from "@/lib/views";
import { AddNote } from "./add-note";
import { CorrectCase } from "./correct-case";
import { HoldCase } from "./hold-case";
import { lateText, waitsText } from "./note-words";

/** Whom the case waits for, and what people wrote down about it. */
export function NotesSection({ view, notes, user, timeZone, neededBy }: { view: CaseView; notes: NoteView[]; user: SessionView["user"]; timeZone: string; /** as the request says */ neededBy: string | null }) {
  const writes = may(user, "note.add");
  const open = view.state !== "closed";
  const drives = view.drives.map(({ id, letter }) => ({ id, letter }));
  return (
    <Section id="notes" title="Notes" note="Never changed afterwards; a correction is a note of its own.">
      <div className="grid gap-4">
        {view.hold ? <NoteBox kind="caution" title={`${waitsText(view.hold)} since ${momentText(view.hold.since, timeZone)}.`}>{view.hold.reason}</NoteBox> : null}
        {notes.length === 0 ? <p className="text-ink-3">No note yet.</p> : (
          <ol className="border-t border-rule">
            {notes.map((note) => (
              <li key={note.id} className="grid grid-cols-[minmax(0,1fr)_auto] items-start gap-x-4 border-b border-rule py-2.5">
                <div className="grid gap-1">
                <p className={`whitespace-pre-line [overflow-wrap:anywhere] ${note.correctedBy ? "text-ink-3" : ""}`}>
                  {note.corrects ? <b>Corrects note {note.corrects}. </b> : null}{note.text}{note.correctedBy ? <b> Corrected by note {note.correctedBy}.</b> : null}
                </p>
                <p className="text-t2 text-ink-2">
                  Note {note.number}{note.drive ? `, Drive ${note.drive}` : ""}, {note.by.name}, {momentText(note.at, timeZone)}
                  {note.happenedAt ? `; happened ${momentText(note.happenedAt, timeZone)}` : ""}
                  {note.lateByHours === null ? "" : <b className="text-caution">, written {lateText(note.lateByHours)}</b>}
                </p>
                </div>
                {writes && !note.correctedBy ? <AddNote caseId={view.id} drives={[]} corrects={note} /> : <span />}
              </li>
            ))}
          </ol>
        )}
        <div className="no-print flex flex-wrap gap-2">
          {writes ? <AddNote caseId={view.id} drives={drives} /> : null}
          {open && may(user, "case.hold") ? <HoldCase caseId={view.id} hold={view.hold} /> : null}
          {open && may(user, "fact.correct") ? <CorrectCase view={view} neededBy={neededBy} /> : null}
        </div>
      </div>
    </Section>
  );
}
