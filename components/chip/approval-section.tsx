"use client";

import { useState } from "react";
import { compositeBehind, madeOf, partText, votesAnchor } from "@/components/composite/composite-words";
import { Button, ButtonLink, Buttons } from "@/components/ui/button";
import { DigestInFull } from "@/components/ui/digest";
import { Note } from "@/components/ui/note";
import { momentText } from "@/components/ui/times";
import { useSay } from "@/components/ui/toast";
import { send } from "@/lib/http/send";
import { may } from "@/lib/core/policy";
import type { ApprovalView, ChipView, ReadView, SessionView } from "@/lib/views";
import { AskApproval } from "./ask-approval";
import { nameOf, NOBODY_LEFT, peopleText } from "./chip-words";
import { Conditions } from "./conditions";
import { ReasonDialog } from "./reason-dialog";

type Ask = "send-back" | "revoke";

/** The conditions at the left; who may sign, what was asked, said or signed at the right. */
export function ApprovalSection({ chip, user, timeZone, onChanged }: { chip: ChipView; user: SessionView["user"]; timeZone: string; onChanged(): Promise<unknown> }) {
  const say = useSay();
  const [asked, setAsked] = useState<Ask | null>(null);
  const { approval, request } = chip;
  const { open } = chip.case;
  const lastRevoked = approval ? null : chip.approvals.filter((a) => a.revoked).at(-1) ?? null;
  const mine = chip.reads.filter((r) => r.stage === "before" && r.operator.id === user.id);
  const barred = chip.policy.twoPersonRule && mine.length > 0;
  const waiting = request && !request.sentBack ? request : null;
  const decidable = chip.state.state === "ready" || chip.state.state === "held";

  return (
    <div className="grid grid-cols-[minmax(0,1fr)_424px] gap-x-10 mid:grid-cols-[minmax(0,1fr)_360px] narrow:grid-cols-[minmax(0,1fr)] narrow:gap-y-[22px] print:grid-cols-[minmax(0,1fr)] print:gap-y-3">
      <Conditions conditions={chip.conditions} />
      <div className="grid content-start gap-3.5">
        {approval ? <Signed approval={approval} composite={compositeBehind(chip.reads, approval.sha256)} timeZone={timeZone} /> : <TwoPeople chip={chip} userId={user.id} />}
        {lastRevoked?.revoked ? <Note kind="caution" title={`The approval of ${momentText(lastRevoked.givenAt, timeZone)} no longer stands.`}>Revoked {momentText(lastRevoked.revoked.at, timeZone)} by {lastRevoked.revoked.by.name}: {lastRevoked.revoked.reason}</Note> : null}
        {!approval && request?.sentBack ? <Note kind="caution" title={`Sent back by ${request.sentBack.by.name}, ${momentText(request.sentBack.at, timeZone)}.`}>{request.sentBack.reason}</Note> : null}
        {!approval && waiting ? <Note kind="note" title={`Asked by ${waiting.askedBy.name}, ${momentText(waiting.askedAt, timeZone)}.`}>{waiting.message ? `“${waiting.message}”` : "Without a message."}</Note> : null}
        {open && !approval && !waiting && may(user, "approval.ask") ? <AskApproval chip={chip} onChanged={onChanged} /> : null}
        <Buttons>
          {open && !approval && decidable && may(user, "approval.give") && !barred ? <ButtonLink variant="lead" href={`/chips/${chip.id}/decision`}>Open the decision sheet</ButtonLink> : null}
          {open && !approval && waiting && may(user, "approval.send-back") ? <Button variant="stop" onClick={() => setAsked("send-back")}>Send back…</Button> : null}
          {open && approval && may(user, "approval.revoke") ? <Button variant="stop" onClick={() => setAsked("revoke")}>Revoke…</Button> : null}
        </Buttons>
        {open && !approval && decidable && may(user, "approval.give") && barred ? <Note kind="note" title={`You ${partText(mine)}, so you can’t approve this image.`}>{chip.approvers.length > 0 ? `${peopleText(chip.approvers.map((p) => p.name))} can.` : "Nobody else may, either."}</Note> : null}
      </div>
      {asked === "send-back" ? (
        <ReasonDialog onClose={() => setAsked(null)} title="Send back to the bench" action="Send back" variant="stop" label="What should be done first?"
          onReason={async (reason) => {
            await send("POST", `/api/chips/${chip.id}/sending-back`, { reason });
            await onChanged();
            say({ text: "Sent back to the bench." });
          }} />
      ) : null}
      {asked === "revoke" && approval ? (
        <ReasonDialog onClose={() => setAsked(null)} title="Revoke the approval" action="Revoke the approval" variant="stop"
          description={chip.transfers.length > 0 ? "The donor then holds an image that is no longer cleared." : "The image may then no longer be handed out for writing."}
          onReason={async (reason) => {
            await send("POST", `/api/approvals/${approval.id}/revocation`, { reason });
            await onChanged();
            say({ text: "The approval no longer stands." });
          }} />
      ) : null}
    </div>
  );
}

function TwoPeople({ chip, userId }: { chip: ChipView; userId: string }) {
  if (!chip.policy.twoPersonRule) return <p><b>The two-person rule is off here.</b> Every approval, log, bundle and summary says so.</p>;
  const takers = peopleText(chip.reads.filter((r) => r.stage === "before" && !r.derived).map((r) => (r.operator.id === userId ? "you" : r.operator.name)));
  const left = chip.approvers.length > 0 ? <> For {chip.designator} that leaves <b>{peopleText(chip.approvers.map((p) => (p.id === userId ? "you" : p.name)))}</b>.</> : ` Nobody who may approve is left. ${NOBODY_LEFT}`;
  return <p><b>Two people, always.</b> Whoever took a read of the original can’t approve its image.{left}{takers ? ` Its reads were taken by ${takers}.` : ""}</p>;
}

function Signed({ approval, composite, timeZone }: { approval: ApprovalView; composite: ReadView | null; timeZone: string }) {
  const reasons = Object.entries(approval.reasons);
  return (
    <>
      <p>Approved by <b>{approval.approvedBy.name}</b>, {momentText(approval.givenAt, timeZone)}{approval.twoPersonRule ? ", who took no read of the original" : ", with the two-person rule off"}: “{approval.statement}”</p>
      {reasons.length > 0 ? <ul>{reasons.map(([code, text]) => <li key={code}>Looked at: “{text}”</li>)}</ul> : null}
      {composite?.derived ? <Note kind="caution" title={`The approved image is a composite, ${nameOf(composite)}.`}>{madeOf(composite.derived)}. <a href={`#${votesAnchor(composite)}`}>See the votes</a></Note> : null}
      <p><span className="text-ink-2">Approved image, SHA-256</span><br /><DigestInFull sha256={approval.sha256} /></p>
    </>
  );
}
