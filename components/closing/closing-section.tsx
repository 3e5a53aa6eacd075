import { ButtonLink, Buttons } from "@/components/ui/button";
import { Section } from "@/components/ui/section";
import { momentText } from "@/components/ui/times";
import type { ClosingView } from "@/lib/views";
import { KIND_WORDS } from "./closing-words";
import { ReopenCase } from "./reopen-case";

/** What went back and how the case ended; nothing is shown before that. */
export function ClosingSection({ caseId, caseRef, closing, releases, timeZone }: { caseId: string; caseRef: string; closing: ClosingView; releases: boolean; timeZone: string }) {
  const { returned, closed } = closing;
  if (!returned && !closed) return null;
  return (
    <Section id="closing" title={closed ? "Returned and closed" : "Returned"} note={closed ? "A closed case takes notes, and a hand-over that was under way can be confirmed; all else waits until a lead reopens it." : "A lead closes the case."}>
      <div className="grid gap-4">
        <dl className="grid grid-cols-[150px_minmax(0,1fr)] gap-x-4 gap-y-2 slim:grid-cols-1 slim:gap-y-0.5 [&_dt]:text-ink-2 [&_dd]:[overflow-wrap:anywhere] slim:[&_dd]:mb-1.5">
          {returned ? (
            <>
              <dt>Went back</dt><dd><ul>{returned.items.map((item, i) => <li key={i}>{item}</li>)}</ul></dd>
              <dt>To</dt><dd>{returned.toPerson}</dd>
              <dt>By</dt><dd>{[returned.carrier ?? "Handed over", returned.tracking && `tracking ${returned.tracking}`, returned.sealNumber && `seal ${returned.sealNumber}`].filter(Boolean).join(", ")}</dd>
              {returned.note ? <><dt>Note</dt><dd className="whitespace-pre-line">{returned.note}</dd></> : null}
              <dt>Recorded</dt><dd>{momentText(returned.at, timeZone)}, {returned.by.name}</dd>
            </>
          ) : <><dt>Went back</dt><dd>No return is recorded.</dd></>}
          {closed ? (
            <>
              <dt>Closed</dt><dd><b>{closed.kind ? KIND_WORDS[closed.kind].label : "Closed"}</b>, {momentText(closed.at, timeZone)}{closed.reason ? <span className="block whitespace-pre-line">{closed.reason}</span> : null}</dd>
            </>
          ) : null}
        </dl>
        <Buttons>
          {returned ? <ButtonLink href={`/cases/${caseId}/print/return-slip`}>Print the return slip</ButtonLink> : null}
          {closed && releases ? <ReopenCase caseId={caseId} caseRef={caseRef} /> : null}
        </Buttons>
      </div>
    </Section>
  );
}
