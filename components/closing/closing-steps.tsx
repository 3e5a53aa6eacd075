import { Button, ButtonLink } from "@/components/ui/button";
import { Mark } from "@/components/ui/mark";
import { unverifiedChips } from "@/lib/core/closing";
import { may } from "@/lib/core/policy";
import { listText } from "@/lib/core/quantity";
import { OTHER_SERIAL_TEXT, startUpWords } from "@/lib/core/start-up";
import type { CaseView, ClosingView, SessionView } from "@/lib/views";
import { CloseCase } from "./close-form";
import { RecordReturn } from "./return-form";
import { startUpMark } from "./start-up-words";

type Drive = ClosingView["drives"][number];

function StartUpStep({ drive, several, acts, lead }: { drive: Drive; several: boolean; acts: boolean; lead: boolean }) {
  const { test, refusal } = drive;
  const of = several ? ` of Drive ${drive.letter}` : "";
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
export function StartUpSteps({ closing, user }: { closing: ClosingView; user: SessionView["user"] }) {
  if (closing.closed) return null;
  const acts = may(user, "start-up.record");
  const next = closing.drives.find((drive) => !drive.test && !drive.refusal);
  const ready = closing.facts.chips.length > 0 && unverifiedChips(closing.facts).length === 0;
  return closing.drives.map((drive) => <StartUpStep key={drive.id} drive={drive} several={closing.drives.length > 1} acts={acts} lead={ready && drive === next} />);
}

/** The return, then the release by a lead. */
export function ReturnSteps({ view, closing, user }: { view: CaseView; closing: ClosingView; user: SessionView["user"] }) {
  const { returned, closed, facts } = closing;
  if (closed) return null;
  const [returns, releases] = [may(user, "case.return"), may(user, "case.release")];
  const open = unverifiedChips(facts);
  const beforeReturn = !facts.received ? "opens when the parcel is here" : open.length > 0 ? `${listText(open)} ${open.length === 1 ? "is" : "are"} not verified; it can go back all the same` : null;
  return (
    <>
      <li>
        <Mark kind={returned ? "ok" : facts.received ? "run" : "wait"} className="[--hole:var(--paper)]" />
        <span><b>{returned ? "Returned" : "Pack what goes back and record the return"}</b><span className="text-ink-2">{returned ? `: ${countItems(returned.items)}` : beforeReturn ? `; ${beforeReturn}` : ""}</span></span>
        {returned ? <ButtonLink href={`/cases/${view.id}/print/return-slip`}>Return slip</ButtonLink> : returns && facts.received ? <RecordReturn caseId={view.id} closing={closing} lead={false} /> : <Button disabled>Record the return…</Button>}
      </li>
      <li>
        <Mark kind={returned ? "run" : "wait"} className="[--hole:var(--paper)]" />
        <span><b>Release and close the case</b><span className="text-ink-2">{releases ? (returned ? "" : "; after the return, or with a reason") : "; a lead closes it"}</span></span>
        {releases ? <CloseCase caseId={view.id} caseRef={view.ref} closing={closing} lead={Boolean(returned) && open.length === 0} /> : <Button disabled>Close the case…</Button>}
      </li>
    </>
  );
}

const countItems = (items: string[]) => (items.length === 1 ? items[0] : `${items.length} things, as the slip lists them`);
