"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { ReasonDialog } from "@/components/chip/reason-dialog";
import { madeOf, votesAnchor } from "@/components/composite/composite-words";
import { Button, ButtonLink, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { Mark } from "@/components/ui/mark";
import { exactText } from "@/components/ui/times";
import { useSay } from "@/components/ui/toast";
import { readName } from "@/lib/core/words";
import { may } from "@/lib/core/policy";
import { send } from "@/lib/http/send";
import type { ApprovalView, ChipView, ReadView, SessionView } from "@/lib/views";

/** The signature that stands on this sheet, and the way to take it back. */
export function Standing({ chip, approval, composite, session }: { chip: ChipView; approval: ApprovalView; composite: ReadView | null; session: SessionView }) {
  const router = useRouter();
  const say = useSay();
  const [asked, setAsked] = useState(false);
  const reasons = Object.entries(approval.reasons);
  return (
    <div className="grid max-w-[76ch] gap-3.5">
      <p className="flex items-start gap-2.5 text-t4"><Mark kind="done" size={20} className="mt-0.5 [--hole:var(--paper)]" /><span><b>Approved by {approval.approvedBy.name}</b>, {exactText(approval.givenAt, session.timeZone)}{approval.twoPersonRule ? ", who took no read of the original." : ", with the two-person rule switched off."}</span></p>
      {composite?.derived ? <Note kind="caution" title={`What is approved is a composite, ${readName("before", composite.number)}.`}>{madeOf(composite.derived)}. <a href={`#${votesAnchor(composite)}`}>See the votes</a></Note> : null}
      <p>“{approval.statement}”</p>
      {reasons.length > 0 ? <ul className="grid gap-1">{reasons.map(([code, text]) => <li key={code}>Approved all the same: “{text}”</li>)}</ul> : null}
      <Buttons>
        <ButtonLink variant="lead" href={`/chips/${chip.id}#transfer`}>Open {chip.designator}</ButtonLink>
        {may(session.user, "approval.revoke") ? <Button variant="stop" onClick={() => setAsked(true)}>Revoke…</Button> : null}
      </Buttons>
      {asked ? (
        <ReasonDialog onClose={() => setAsked(false)} title="Revoke the approval" action="Revoke the approval" variant="stop"
          description={chip.transfers.some((t) => t.approvalId === approval.id) ? "The donor then holds an image that is no longer cleared. Nothing is erased: the revocation is a new entry." : "The image may then no longer be handed out for writing. Nothing is erased: the revocation is a new entry."}
          onReason={async (reason) => {
            await send("POST", `/api/approvals/${approval.id}/revocation`, { reason });
            router.refresh();
            say({ text: "The approval no longer stands." });
          }} />
      ) : null}
    </div>
  );
}
