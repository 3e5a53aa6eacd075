import { ButtonLink, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { dayYearText } from "@/components/ui/times";
import { countOf } from "@/lib/core/quantity";
import type { RequestSectionView } from "@/lib/views";
import { AnswerWish } from "./answer-wish";

const leftText = (days: number) => (days > 1 ? `${countOf(days, "day")} left` : days === 1 ? "the last day" : days === 0 ? "due today" : `${countOf(-days, "day")} late`);

/** A customer's wish for deletion on the case's page: when, by when it is answered, and the two ways to do that. */
export function WishNote({ view, timeZone, answers }: { view: RequestSectionView & { deletion: NonNullable<RequestSectionView["deletion"]> }; timeZone: string; answers: boolean }) {
  const { deletion } = view;
  const day = (iso: string) => dayYearText(iso, timeZone);
  const { answered } = deletion;
  return (
    <Note kind={answered ? "note" : "caution"} title={`The customer asked for deletion on ${day(deletion.askedAt)}.`}>
      {answered
        ? <>{answered.by} answered on {day(answered.at)}: {answered.answer ? <q dir="auto" className="whitespace-pre-line [overflow-wrap:anywhere]">{answered.answer}</q> : "the images were erased."} </>
        : <>A lead answers by {day(deletion.answerBy)}: <b>{leftText(deletion.daysLeft)}</b>. </>}
      {deletion.message ? <>They wrote: <q dir="auto" className="whitespace-pre-line [overflow-wrap:anywhere]">{deletion.message}</q></> : "They wrote no message."}
      {answers && !answered ? (
        <>
          <Buttons className="no-print pt-3">
            {view.closed ? <ButtonLink href="#images">Erase the images</ButtonLink> : null}
            <AnswerWish requestId={view.id} email={view.answers.email} />
          </Buttons>
          {view.closed ? null : <p className="pt-2 text-t2">To erase the images, close the case first.</p>}
        </>
      ) : null}
    </Note>
  );
}
