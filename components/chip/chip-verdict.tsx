"use client";

import { useState } from "react";
import { Button, ButtonLink } from "@/components/ui/button";
import { Verdict } from "@/components/ui/verdict";
import { may } from "@/lib/core/policy";
import type { ChipView, ReadBackView, SessionView } from "@/lib/views";
import { AgreementMatrix, ReadBackMatrix } from "./agreement-matrix";
import { compareHref, isKept, nameOf, oddReads, verdictMark } from "./chip-words";
import { ReadDialogs } from "./read-dialogs";

/** What was found, and the step that leads on: one leading button, at most two more. */
export function ChipVerdict({ chip, readBack, user, onReadDonor, onChanged }: { chip: ChipView; readBack: ReadBackView | null; user: SessionView["user"]; /** leads to the form for the donor's own content */ onReadDonor(): void; onChanged(): Promise<unknown> }) {
  const [aside, setAside] = useState(false);
  const state = chip.state.state;
  const original = chip.boardRole === "original";
  const { open } = chip.case;
  const bench = open && may(user, "read.store");
  const odd = oddReads(chip.reads, "before");
  const loner = open && odd.length === 1 && may(user, "read.set-aside", { operatorId: odd[0].operator.id }) ? odd[0] : null;
  const signs = open && may(user, "approval.give") && !(chip.policy.twoPersonRule && chip.reads.some((r) => r.stage === "before" && r.operator.id === user.id));
  const several = chip.reads.filter((r) => r.stage === "before").length > 1;

  // whoever has asked can only wait: nothing leads on
  const asked = state === "ready" && chip.request && !chip.request.sentBack
    ? <ButtonLink href="#approval">See who may sign</ButtonLink>
    : <ButtonLink variant="lead" href="#approval">{state === "ready" ? "Ask for approval" : "See what stands against it"}</ButtonLink>;

  const first = () => {
    if (!original) return chip.pair ? <ButtonLink variant="lead" href={`/chips/${chip.pair.id}`}>Open original {chip.pair.designator}</ButtonLink> : null;
    if (["unread", "needs-reads", "reads-disagree"].includes(state) && bench) return <ButtonLink variant="lead" href="#add">{state === "unread" ? "Add reads" : "Add a read"}</ButtonLink>;
    if (isKept(chip)) return null;
    if (state === "ready" && bench && !chip.pair) return <ButtonLink variant="lead" href={`/drives/${chip.drive.id}`}>Record the donor’s chip</ButtonLink>;
    if (state === "ready" && bench && !chip.donorSaved) return <Button variant="lead" onClick={onReadDonor}>Save the donor’s content</Button>;
    if (["ready", "held"].includes(state)) return signs ? <ButtonLink variant="lead" href={`/chips/${chip.id}/decision`}>Open the decision sheet</ButtonLink> : bench ? asked : null;
    if ((state === "approved" || state === "failed") && bench) return <ButtonLink variant="lead" href="#transfer">{state === "approved" ? "Write to the donor" : "Write again"}</ButtonLink>;
    if (state === "written" && bench) return <ButtonLink variant="lead" href="#add">Add a read-back</ButtonLink>;
    return state === "verified" ? <ButtonLink variant="lead" href={`/cases/${chip.case.id}`}>Open case {chip.case.ref}</ButtonLink> : null;
  };

  return (
    <>
      <Verdict mark={verdictMark(chip)} sentence={chip.state.sentence} why={chip.why}
        aside={readBack ? <ReadBackMatrix backs={readBack.backs} /> : <AgreementMatrix matrix={chip.matrix} />}
        buttons={(
          <>
            {first()}
            {several || readBack ? <ButtonLink href={compareHref(chip, readBack)}>Compare the bytes</ButtonLink> : null}
            {loner ? <Button onClick={() => setAside(true)}>Set {nameOf(loner)} aside…</Button> : null}
          </>
        )} />
      <ReadDialogs asked={aside && loner ? { read: loner, action: "set-aside" } : null} chip={chip} onClose={() => setAside(false)} onChanged={onChanged} />
    </>
  );
}
