import Link from "next/link";
import { Mark, type MarkKind } from "@/components/ui/mark";
import { Note } from "@/components/ui/note";
import { countOf, listText } from "@/lib/core/quantity";
import type { ImportAnswer, ImportLine } from "@/lib/core/shelf";

const MARK: Record<ImportLine["result"], MarkKind> = { new: "ok", changed: "note", same: "wait", refused: "block" };
const WORD: Record<ImportLine["result"], [tried: string, done: string]> = { new: ["New", "Added"], changed: ["Changes", "Changed"], same: ["As on record", "As on record"], refused: ["Can’t be taken", "Can’t be taken"] };

/** What a file would do, or did, line by line; lines that are as on record are only counted. */
export function ImportLines({ answer: { done, counts, lines, left } }: { answer: ImportAnswer }) {
  const parts = [counts.new > 0 && `${countOf(counts.new, "board")} ${done ? "added" : "new"}`, counts.changed > 0 && `${countOf(counts.changed, "board")} ${done ? "changed" : "to change"}`, counts.same > 0 && `${countOf(counts.same, "line")} as on record`, counts.refused > 0 && `${countOf(counts.refused, "line")} that can’t be taken`].filter((part): part is string => Boolean(part));
  const sums = `${listText(parts)}.`;
  return (
    <div className="grid gap-3">
      {done ? <Note kind="ok" role="status" title="The shelf now says so.">{sums} <Link href="/shelf">Open the shelf</Link></Note>
        : counts.refused > 0 ? <Note kind="block" role="status" title="Nothing is changed while a line can’t be taken.">{sums} Mend these lines in the file and try it again.</Note>
        : counts.new + counts.changed === 0 ? <Note kind="ok" role="status" title="Nothing would change.">{sums}</Note>
        : <Note role="status" title="Nothing is changed yet.">{sums} Look through the lines, then import them.</Note>}
      {lines.length > 0 ? (
        <table className="ruled lines">
          <caption className="sr-only">Lines of the file</caption>
          <thead><tr><th scope="col">Line</th><th scope="col">Result</th><th scope="col">Number</th><th scope="col">What</th></tr></thead>
          <tbody>
            {lines.map((line) => (
              <tr key={line.line}>
                <th scope="row"><span className="hidden phone:inline">Line </span>{line.line}</th>
                <td className="whitespace-nowrap"><Mark kind={MARK[line.result]} className="[--hole:var(--paper)]" /> {WORD[line.result][done ? 1 : 0]}</td>
                <td className="font-mono whitespace-nowrap">{line.number ?? <span className="font-face text-ink-3">{line.result === "new" ? "gets one" : "none"}</span>}</td>
                <td className="l-full [overflow-wrap:anywhere]">{line.sentence}</td>
              </tr>
            ))}
          </tbody>
        </table>
      ) : null}
      {left > 0 ? <p className="text-ink-2">{countOf(left, "more line")} not shown here.</p> : null}
    </div>
  );
}
