import { ButtonLink, Buttons } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Mark, type MarkKind } from "@/components/ui/mark";
import { Note } from "@/components/ui/note";
import { PaperName } from "@/components/ui/paper-name";
import { dayYearText } from "@/components/ui/times";
import { countOf } from "@/lib/core/quantity";
import type { RequestStep } from "@/lib/core/request-state";
import { DELETION_ANSWER_DAYS } from "@/lib/limits";
import type { RequestPageView } from "@/lib/views";
import { reachWords } from "./contact-words";
import { AskDeletion, WithdrawRequest } from "./customer-steps";
import { Told } from "./told";

const MARK: Record<RequestStep, MarkKind> = {
  requested: "wait", received: "run", reading: "run", checking: "run", writing: "run", "reading-back": "run", ready: "ok", waiting: "wait", question: "caution",
  "no-chip": "note", returned: "done", closed: "aside", withdrawn: "aside",
};

/** How it stands, in plain words, for the one who asked. */
export function CustomerPage({ view, token, timeZone }: { view: RequestPageView; token: string; timeZone: string }) {
  const { state } = view;
  const day = (iso: string) => dayYearText(iso, timeZone);
  const ask = reachWords(view.contact);
  const images = view.answers.keepDays;
  return (
    <main id="main" tabIndex={-1} className="rq outline-none">
      <PaperName what={`Case ${view.refChecked}`} />
      <header className="rq-head">
        <p className="font-semibold text-copper">{view.workshop}</p>
        <h1 className="text-t7 font-bold tracking-[-0.012em] phone:text-[1.625rem] phone:leading-8">Your case <span className="font-mono whitespace-nowrap">{view.refChecked}</span></h1>
      </header>
      <div className="min-w-0">
        <section className="rq-part" aria-labelledby="rq-state">
          <div className="grid grid-cols-[28px_minmax(0,1fr)] gap-3.5">
            <Mark kind={MARK[state.step]} size={28} className="mt-0.5 [--hole:var(--paper)]" />
            <div>
              <h2 id="rq-state" className="max-w-[38em] text-t5 font-strong">{state.title}</h2>
              <p className="mt-1 max-w-[62ch] text-t4">{state.next}</p>
              {state.since ? <p className="mt-1 text-ink-2">Since {day(state.since)}.</p> : null}
            </div>
          </div>
          {state.question ? <Note kind="caution" title="What we would like to know" className="mt-4"><span dir="auto" className="whitespace-pre-line [overflow-wrap:anywhere]">{state.question}</span></Note> : null}
          {state.step === "question" ? <p className="pt-3">Your answer goes to <b>{ask}</b>.</p> : null}
          {view.slip ? (
            <Buttons className="pt-4">
              <ButtonLink variant="lead" href={`/request/${token}/slip`} prefetch={false}><Icon name="print" />Slip for the parcel</ButtonLink>
              <span className="text-ink-2">One page: how to pack, and the address.</span>
            </Buttons>
          ) : null}
        </section>
        {view.slip ? (
          <section className="rq-part"><Note kind="caution" title="Please don’t power the drive again.">Each try can spoil the chips further. Send the enclosure with its small board, too: it may hold the key to your data.</Note></section>
        ) : null}
        {view.summarySentAt ? (
          <section className="rq-part"><h2 className="text-t4 font-bold">The verification summary</h2><p className="pt-1">We sent it to you on {day(view.summarySentAt)}. It has a private link of its own, which stands in that mail only.</p></section>
        ) : null}
        <section className="rq-part" aria-labelledby="rq-told">
          <h2 id="rq-told" className="pb-3 text-t4 font-bold">What you told us on {day(view.requestedAt)}</h2>
          <Told answers={view.answers} />
          <p className="pt-3 text-ink-2">{view.photos > 0 ? `${countOf(view.photos, "photo")} came along.` : "No photo came along."} {view.slip ? "If something is wrong, write it on the slip by hand, or tell us." : "If something is wrong, tell us."}</p>
        </section>
      </div>
      <aside className="rq-side after grid content-start gap-5" aria-label="Your data and your way out">
        <section>
          <h2>Whom to ask</h2>
          <p className="pt-1 [overflow-wrap:anywhere]">{ask}{view.hours ? `, ${view.hours}` : ""}. Name your case number.</p>
        </section>
        <section>
          <h2>Your data</h2>
          {view.erasedAt ? <Note kind="note" title={`We erased the images on ${day(view.erasedAt)}.`} className="mt-2">What we kept of your chips, and the photos, are gone from our store.</Note> : null}
          {view.deletion ? (
            <Note kind="note" title={`You asked for deletion on ${day(view.deletion.askedAt)}.`} className="mt-2">{view.deletion.answered?.answer ? <>We answered on {day(view.deletion.answered.at)}: <q dir="auto" className="whitespace-pre-line [overflow-wrap:anywhere]">{view.deletion.answered.answer}</q>{view.erasedAt ? null : <> Your wish stays on record. If you don’t agree, ask {ask}.</>}</> : view.deletion.answered ? null : <>A lead technician of {view.workshop} answers you by {day(view.deletion.answerBy)}. If nobody has by then, ask {ask}.</>}</Note>
          ) : view.erasedAt ? null : (
            <>
              <p className="pt-1 pb-2.5">We keep images of the chips for {images} days after the drive has gone back. You can ask for deletion at any time; a lead technician answers within {DELETION_ANSWER_DAYS} days.</p>
              <AskDeletion token={token} answerDays={DELETION_ANSWER_DAYS} />
            </>
          )}
          <p className="pt-2 text-t2 text-ink-2">What stays in any case: the log of every step with check numbers of the images. Your name is not in it, and no image can be made from it.</p>
        </section>
        {view.withdraws ? <section><h2>Changed your mind?</h2><p className="pt-1 pb-2.5">As long as the parcel isn’t here you can take the request back.</p><WithdrawRequest token={token} refChecked={view.refChecked} /></section> : null}
        <p className="text-t2 text-ink-2">{view.ends ? `This page ends on ${day(view.ends)}.` : "This page stays until some time after the case is closed."} Whoever has its address sees it: don’t pass it on.</p>
      </aside>
    </main>
  );
}
