"use client";

import { useRouter } from "next/navigation";
import { useMemo, useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import { ReasonDialog } from "@/components/chip/reason-dialog";
import { compositeBehind } from "@/components/composite/composite-words";
import { Votes } from "@/components/composite/votes";
import { Button, Buttons } from "@/components/ui/button";
import { HelpLink } from "@/components/ui/help-link";
import { Note } from "@/components/ui/note";
import { rulesFrom } from "@/components/ui/rules";
import { Section } from "@/components/ui/section";
import { useSay } from "@/components/ui/toast";
import { REASON_CHARACTERS } from "@/lib/core/approval";
import { readTitle } from "@/lib/core/derived";
import { may } from "@/lib/core/policy";
import { readsText } from "@/lib/core/quantity";
import { Refusal, send } from "@/lib/http/send";
import type { DecisionView, SessionView } from "@/lib/views";
import { standsAgainst, standsFor, stillOpen } from "./against";
import { BeforeYouSign } from "./before-you-sign";
import { reasonLength, sameDigits } from "./decision-form";
import type { DecisionForm } from "./decision-rules";
import { ImageFacts } from "./image-facts";
import { Ledger } from "./ledger";
import { Sign } from "./sign";
import { Standing } from "./standing";
import { DonorFacts, WhereItGoes } from "./where-it-goes";
import { maySign, WhoMaySign } from "./who-may-sign";

/** The whole sheet: the image, for and against, where it goes, and the signature between double rules. */
export function DecisionScreen({ view, session }: { view: DecisionView; session: SessionView }) {
  const { chip, image } = view;
  const { user } = session;
  const router = useRouter();
  const say = useSay();
  const [looked, setLooked] = useState<ReadonlySet<string>>(new Set());
  const [refusal, setRefusal] = useState<string | null>(null);
  const [sendingBack, setSendingBack] = useState(false);
  const composite = compositeBehind(chip.reads, image?.sha256);
  const against = useMemo(() => standsAgainst(view), [view]);
  const codes = useMemo(() => [...new Set(against.flatMap((i) => (i.reasonFor ? [i.reasonFor] : [])))], [against]);
  const resolver = useMemo(() => rulesFrom(() => import("./decision-rules").then((m) => m.decisionForm(image?.sha256 ?? "", codes))), [image, codes]);
  const { register, control, handleSubmit, formState: { errors, isSubmitting } } = useForm<DecisionForm>({ resolver, mode: "onTouched", defaultValues: { statement: "", last8: "", reasons: {} } });
  const typed = useWatch({ control });
  const matches = image !== null && sameDigits(typed.last8 ?? "", image.sha256);
  const signs = !chip.approval && image !== null && maySign(chip, user);
  const open = stillOpen(against, looked, {
    reasons: codes.filter((code) => reasonLength(typed.reasons?.[code]) < REASON_CHARACTERS).length, statement: (typed.statement ?? "").trim().length >= 3, last8: matches,
  });

  function onLook(key: string, seen: boolean) {
    setLooked((before) => new Set(seen ? [...before, key] : [...before].filter((k) => k !== key)));
  }

  const submit = handleSubmit(async ({ statement, reasons }) => {
    if (!image || !chip.pair || open) return;
    setRefusal(null);
    try {
      await send("POST", `/api/chips/${chip.id}/approval`, {
        sha256: image.sha256, donorChipId: chip.pair.id, statement, reasons: Object.fromEntries(codes.map((code) => [code, reasons[code]])),
        lookedAt: against.filter((i) => looked.has(i.key)).map((i) => i.key),
      });
      say({ text: `The ${composite ? "composite" : "image"} is cleared for writing to donor ${chip.pair.designator}.` });
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    }
    // after a refusal as well: the facts on the sheet may be older than the rule that refused
    router.refresh();
  });

  // stays whatever the refreshed sheet shows, also when another approval came first
  const refused = refusal ? <Note kind="block" role="alert" title="You did not approve the image." className="mb-4">{refusal} <HelpLink href="/help/approval" about="What an approval needs" words="More in the help" /></Note> : null;
  const waiting = chip.request && !chip.request.sentBack;
  const sendBack = waiting && chip.case.open && may(user, "approval.send-back") ? () => setSendingBack(true) : null;
  return (
    <>
      <Section strong title="The image" note={composite ? `${readTitle(composite)}: derived, no read.` : image ? `Held by ${readsText(image.reads)}.` : undefined}><ImageFacts view={view} /></Section>
      <Section title="For and against" note={signs ? "Tick what stands against it once you’ve looked at it." : undefined}>
        <Ledger stands={standsFor(view)} against={against} looked={looked} onLook={onLook} signs={signs} register={register} errors={errors} />
      </Section>
      {composite ? <Section title="The votes" note="What each disputed byte of the composite rests on."><Votes read={composite} /></Section> : null}
      <Section wide title="Where it goes" note={view.donor ? `Donor board ${view.donor.board.boardNumber}.` : undefined} aside={<DonorFacts view={view} />}>
        <WhereItGoes view={view} timeZone={session.timeZone} />
      </Section>
      {chip.approval ? (
        <Section strong title="Signed" note="Stands in the custody log.">{refused}<Standing chip={chip} approval={chip.approval} composite={composite} session={session} /></Section>
      ) : (
        <>
          <Section title="Before you sign"><BeforeYouSign chip={chip} composite={composite} /></Section>
          <Section strong title="Sign" note="Goes into the custody log, signed.">
            {refused}
            <p className="hidden print:block"><b>Not signed as this was printed.</b> An image is cleared on the screen only: no signature on this paper clears it.</p>
            {signs
              ? <Sign chip={chip} user={user} composite={composite !== null} open={open} matches={matches} busy={isSubmitting} register={register} errors={errors} onSubmit={submit} onSendBack={sendBack} />
              : (
                <div className="grid gap-3.5">
                  <WhoMaySign chip={chip} user={user} />
                  {sendBack ? <Buttons><Button variant="stop" onClick={sendBack}>Send back…</Button></Buttons> : null}
                </div>
              )}
          </Section>
        </>
      )}
      {sendingBack ? (
        <ReasonDialog onClose={() => setSendingBack(false)} title="Send back to the bench" action="Send back" variant="stop" label="What should be done first?"
          onReason={async (reason) => {
            await send("POST", `/api/chips/${chip.id}/sending-back`, { reason });
            router.refresh();
            say({ text: "Sent back to the bench." });
          }} />
      ) : null}
    </>
  );
}
