import { Button, ButtonLink } from "@/components/ui/button";
import { Mark } from "@/components/ui/mark";
import { type CaseStep, leadingStep, unverifiedChips } from "@/lib/core/closing";
import { may } from "@/lib/core/policy";
import { listText } from "@/lib/core/quantity";
import { OTHER_SERIAL_TEXT, startUpWords } from "@/lib/core/start-up";
import type { CaseView, ClosingView, SessionView } from "@/lib/views";
import { CloseCase } from "./close-case";
import { RecordReturn } from "./record-return";
import { startUpMark } from "./start-up-words";

type Drive = ClosingView["drives"][number];

/** The step of this case that stands out for this person. */
export function stepThatLeads(view: CaseView, { drives, facts, closed }: ClosingView, user: SessionView["user"]): CaseStep | null {
  if (closed) return null;
  const moving = drives.filter((drive) => !drive.noChip && !drive.onlyKept);
  return leadingStep({
    ...facts, nothingToMove: drives.length > 0 && moving.length === 0, summarySent: view.shares.some((share) => !share.withdrawnAt),
    tests: moving.map(({ test }) => test && test.spins && test.ready && test.serialMatches !== false),
  }, { works: may(user, "read.store"), sends: may(user, "summary.send"), returns: may(user, "case.return"), releases: may(user, "case.release") });
}

function StartUpStep({ drive, several, acts, lead }: { drive: Drive; several: boolean; acts: boolean; lead: boolean }) {
  const { test, refusal } = drive;
  const of = several ? ` of Drive ${drive.letter}` : "";
  if (drive.noChip) {
    return (
      <li>
        <Mark kind="note" className="[--hole:var(--paper)]" />
        <span><b>Nothing to read, write or test{of}</b><span className="text-ink-2">: its own data lies inside the main controller. Put the case on hold while the customer decides, then send the drive back and close the case without transfer</span></span>
        <span />
      </li>
    );
  }
  if (drive.onlyKept) return null;
  const words = acts && !refusal && !test ? "Test it" : "Look";
  return (
    <li>
      <Mark kind={test ? startUpMark(test) : refusal ? "wait" : "run"} className="[--hole:var(--paper)]" />
      <span><b>{test ? `Start-up${of} tested` : `Test the start-up${of} with the donor board`}</b><span className="text-ink-2">{test ? `: ${startUpWords(test)}${test.serialMatches === false ? `. ${OTHER_SERIAL_TEXT}` : ""}` : refusal ? "; opens when its chips are verified" : ""}</span></span>
      <ButtonLink variant={lead && acts ? "lead" : "plain"} href={`/drives/${drive.id}#start-up`}>{words}<span className="sr-only">, start-up{of}</span></ButtonLink>
    </li>
  );
}

/** The test of each drive: after its chips are verified, before anything goes back. */
export function StartUpSteps({ closing, user, leads }: { closing: ClosingView; user: SessionView["user"]; leads: CaseStep | null }) {
  if (closing.closed) return null;
  const acts = may(user, "start-up.record");
  const next = closing.drives.find((drive) => !drive.noChip && !drive.onlyKept && !drive.test && !drive.refusal);
  return closing.drives.map((drive) => <StartUpStep key={drive.id} drive={drive} several={closing.drives.length > 1} acts={acts} lead={leads === "start-up" && drive === next} />);
}

/** The return, then the release by a lead. */
export function ReturnSteps({ view, closing, user, leads }: { view: CaseView; closing: ClosingView; user: SessionView["user"]; leads: CaseStep | null }) {
  const { returned, closed, facts } = closing;
  if (closed) return null;
  const [returns, releases] = [may(user, "case.return"), may(user, "case.release")];
  const open = unverifiedChips(facts);
  const nothing = facts.chips.length === 0 && !closing.drives.some((drive) => drive.noChip);
  const early = nothing || open.length > 0;
  const beforeReturn = !facts.received ? "opens when the parcel is here" : nothing ? "no chip is recorded yet; it can go back all the same" : open.length > 0 ? `${listText(open)} ${open.length === 1 ? "is" : "are"} not verified; it can go back all the same` : null;
  return (
    <>
      <li>
        <Mark kind={returned ? "ok" : facts.received && !early ? "run" : "wait"} className="[--hole:var(--paper)]" />
        <span><b>{returned ? "Returned" : "Pack what goes back and record the return"}</b><span className="text-ink-2">{returned ? `: ${countItems(returned.items)}` : beforeReturn ? `; ${beforeReturn}` : ""}</span></span>
        {returned ? <ButtonLink href={`/cases/${view.id}/print/return-slip`}>Return slip</ButtonLink> : returns && facts.received ? <RecordReturn caseId={view.id} closing={closing} lead={leads === "return"} /> : <Button disabled>Record the return…</Button>}
      </li>
      <li>
        <Mark kind={returned ? "run" : "wait"} className="[--hole:var(--paper)]" />
        <span><b>Release and close the case</b><span className="text-ink-2">{releases ? (returned ? "" : "; after the return, or with a reason") : "; a lead closes it"}</span></span>
        {releases ? <CloseCase caseId={view.id} caseRef={view.ref} closing={closing} lead={leads === "close"} /> : <Button disabled>Close the case…</Button>}
      </li>
    </>
  );
}

const countItems = (items: string[]) => (items.length === 1 ? items[0] : `${items.length} things, as the slip lists them`);
