import { ButtonLink, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { Section } from "@/components/ui/section";
import { dayYearText, dueText } from "@/components/ui/times";
import { countOf } from "@/lib/core/quantity";
import type { ErasureView } from "@/lib/views";
import { EraseImages } from "./erase-images";
import { amountText, CAUSE_WORDS } from "./erasure-words";
import { KeepLonger } from "./keep-longer";

const dayYear = (day: string) => `${dueText(day)} ${day.slice(0, 4)}`;

/** What is stored of a closed case, how long yet, and its end. Nothing happens here by itself. */
export function ImagesSection({ view, told, erases, timeZone }: {
  view: ErasureView;
  /** how the day came about, in words */
  told: string;
  /** may erase and keep longer */
  erases: boolean;
  timeZone: string;
}) {
  const { goes, stays, photos, bytes, erasures, eraseOn, kept, wish } = view;
  const nothing = goes.length === 0 && stays.length === 0;
  // erased, and nothing of it is stored again
  const over = nothing && erasures.length > 0;
  return (
    <Section id="images" title="Images" note="Nothing is erased by itself. Digests stay in the log, always.">
      <div className="grid gap-4">
        <dl className="grid grid-cols-[184px_minmax(0,1fr)] gap-x-4 gap-y-2 slim:grid-cols-1 slim:gap-y-0.5 [&_dt]:text-ink-2 [&_dd]:[overflow-wrap:anywhere] slim:[&_dd]:mb-1.5">
          {eraseOn && !over ? <><dt>Images due for erasure on</dt><dd><b>{dayYear(eraseOn)}</b>. {told}</dd></> : null}
          {kept && !over ? <><dt>Kept longer</dt><dd><b>until {dayYear(kept.until)}</b>: <span className="whitespace-pre-line">{kept.reason}</span></dd></> : null}
          <dt>Stored</dt>
          <dd>{nothing ? "Nothing." : goes.length > 0 ? amountText({ images: goes.length - photos, photos, bytes }) : "Nothing that this case alone uses."}{stays.length > 0 ? <span className="block text-ink-2">{countOf(stays.length, "image")} more: the same bytes are used elsewhere too, so an erasure of this case leaves {stays.length === 1 ? "it" : "them"} stored.</span> : null}</dd>
          {erasures.map((one) => (
            <ErasedRow key={one.id} one={one} timeZone={timeZone} />
          ))}
        </dl>
        {erases && wish && !wish.answeredAt ? <Note kind="caution" title={`The customer asked for deletion on ${dayYearText(wish.askedAt, timeZone)}.`}>Erase the images here, or answer why not yet under <a href="#request">Request</a>.</Note> : null}
        <Buttons className="no-print">
          {erases && !over ? <EraseImages view={view} /> : null}
          {erases && eraseOn && !nothing ? <KeepLonger view={view} /> : null}
          {erasures.length > 0 ? <ButtonLink href={`/cases/${view.caseId}/print/erasure`}>Print the certificate</ButtonLink> : null}
        </Buttons>
      </div>
    </Section>
  );
}

function ErasedRow({ one, timeZone }: { one: ErasureView["erasures"][number]; timeZone: string }) {
  return (
    <>
      <dt>Erased</dt>
      <dd><b>{dayYearText(one.at, timeZone)}</b> by {one.by.name}, because {CAUSE_WORDS[one.cause]}: {amountText(one)}.<span className="block whitespace-pre-line">{one.reason}</span></dd>
    </>
  );
}
