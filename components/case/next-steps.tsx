import type { ReactNode } from "react";
import { stateMark } from "@/components/chip/chip-words";
import { compositeWords } from "@/components/composite/composite-words";
import { waitsText } from "@/components/note/note-words";
import { originalOf } from "@/components/drive/drive-words";
import { Button, ButtonLink } from "@/components/ui/button";
import { Mark } from "@/components/ui/mark";
import { momentText } from "@/components/ui/times";
import type { CaseStep } from "@/lib/core/closing";
import { may } from "@/lib/core/policy";
import type { ChipStateCode, Policy } from "@/lib/core/words";
import type { CaseView, ChipSummary, SessionView } from "@/lib/views";
import { byUrgency, chipsToTransfer, hasNoChipToMove, recordsMissing, waitsFor } from "./case-words";
import { MakeBundle } from "./make-bundle";
import { SendSummary } from "./send-summary";

const STEP: Record<ChipStateCode, { word: string; at: string }> = {
  unread: { word: "Add reads", at: "#add" }, "needs-reads": { word: "Add a read", at: "#add" }, "reads-disagree": { word: "Add a read", at: "#add" },
  held: { word: "Look", at: "" }, ready: { word: "Open", at: "" }, approved: { word: "Write", at: "#transfer" },
  written: { word: "Add a read-back", at: "#add" }, failed: { word: "Write again", at: "#transfer" }, verified: { word: "Look", at: "" },
};

function ChipStep({ chip, drive, lead, acts }: { chip: ChipSummary; drive: string | null; lead: boolean; acts: boolean }) {
  const { word, at } = acts ? STEP[chip.state.state] : { word: "Open", at: "" };
  return (
    <li>
      <Mark kind={stateMark(chip.state.state)} className="[--hole:var(--paper)]" />
      <span><b>{chip.designator}{drive ? ` of Drive ${drive}` : ""}, {chip.state.label.toLowerCase()}.</b> {chip.state.sentence}{chip.composite && !chip.state.sentence.includes("composite") ? ` The image is a ${compositeWords(chip.composite)}.` : ""}{chip.pair ? null : <span className="text-ink-2"> No donor chip is paired yet: add it on the donor board.</span>}</span>
      <ButtonLink variant={lead ? "lead" : "plain"} href={`/chips/${chip.id}${at}`}>{word}<span className="sr-only">, {chip.designator}</span></ButtonLink>
    </li>
  );
}

/**
 * What is to be done on this case, the most urgent first; what can't be done yet says why. `tests` stand after the chips,
 * `end` after the summary. A closed case has only what leaves the house.
 */
export function NextSteps({ view, policy, user, leads, mailStays, timeZone, tests, end }: { view: CaseView; policy: Policy; user: SessionView["user"]; leads: CaseStep | null; mailStays: boolean; timeZone: string; tests?: ReactNode; end?: ReactNode }) {
  const acts = may(user, "read.store");
  const open = view.state === "closed" ? [] : byUrgency(chipsToTransfer(view.drives)).filter((chip) => chip.state.state !== "verified");
  const several = view.drives.length > 1;
  const letterOf = (chip: ChipSummary) => (several ? view.drives.find((drive) => originalOf(drive)?.chips.some((one) => one.id === chip.id))?.letter ?? null : null);
  const waits = waitsFor(view.drives);
  // a drive that ends before any chip is read leaves nothing to sum up
  const nothing = view.drives.length > 0 && view.drives.every(hasNoChipToMove) && chipsToTransfer(view.drives).length === 0;
  const sends = may(user, "summary.send");
  const sent = view.shares.filter((share) => !share.withdrawnAt).reduce<CaseView["shares"][number] | null>((last, share) => (last && last.createdAt >= share.createdAt ? last : share), null);
  const missing = view.state === "open" ? recordsMissing(view.drives) : null;
  return (
    <ol className="next-steps">
      {view.hold ? <li><Mark kind="caution" className="text-caution" /><span><b>{waitsText(view.hold)}.</b> {view.hold.reason}</span><ButtonLink href="#notes">Look<span className="sr-only">, why the case waits</span></ButtonLink></li> : null}
      {missing ? <li><Mark kind="run" className="[--hole:var(--paper)]" /><span><b>{missing}</b><span className="text-ink-2">, above on this page</span></span><span /></li> : null}
      {open.map((chip, i) => <ChipStep key={chip.id} chip={chip} drive={letterOf(chip)} lead={i === 0 && leads === "chips"} acts={acts} />)}
      {tests}
      {nothing ? null : (
        <li>
          <Mark kind={sent ? "ok" : waits ? "wait" : "run"} className="[--hole:var(--paper)]" />
          {sent
            ? <span><b>Summary sent to the customer</b><span className="text-ink-2">: {momentText(sent.createdAt, timeZone)}, {sent.openedAt ? `opened ${momentText(sent.openedAt, timeZone)}` : "not opened yet"}</span></span>
            : <span><b>Send the summary to the customer</b>{waits ? <span className="text-ink-2">; {waits}</span> : null}{sends ? null : <span className="text-ink-2">{waits ? ", and a lead sends it" : "; a lead sends it"}</span>}</span>}
          {sends && !waits ? <SendSummary view={view} policy={policy} lead={leads === "summary"} mailStays={mailStays} /> : sent ? <span /> : <Button disabled>Send summary…</Button>}
        </li>
      )}
      {end}
      {may(user, "bundle.make") ? (
        <li>
          <Mark kind="note" />
          <span><b>Case bundle for the auditor</b><span className="text-ink-2">: images, digests and log in one file; can be made at any time</span></span>
          <MakeBundle caseId={view.id} />
        </li>
      ) : null}
    </ol>
  );
}
