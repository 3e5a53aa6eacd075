import { Qr } from "@/components/print/qr";
import { Mark } from "@/components/ui/mark";
import { dayText, dayYearText } from "@/components/ui/times";
import { chipsOf, comesBackSentence, leadSentence, notStarted, ownBoardSentence, promiseLimits, steps } from "@/lib/core/summary-words";
import type { SummaryView } from "@/lib/views";
import { SummaryChip } from "./summary-chip";

/** From three chips on each keeps one strip, so that the sheet stays one page. */
const BOTH_STRIPS_TO = 2;

/** The customer's page: plain words, digests in full, and what all this does not promise. */
export function SummarySheet({ summary, link, timeZone }: { summary: SummaryView; link: string; timeZone: string }) {
  const chips = chipsOf(summary);
  const verified = chips.length > 0 && chips.every((c) => c.verified);
  const made = chips.filter((c) => c.composite);
  const untested = notStarted(summary);
  const done = steps(summary, (iso) => dayText(iso, timeZone));
  return (
    <main id="main" className="sheet">
      <header className="flex flex-wrap items-end justify-between gap-x-6 gap-y-2 border-b-[3px] border-double border-rule-2 pb-3">
        <div><p className="font-semibold text-copper">{summary.workshop}</p><h1 className="text-[1.75rem] leading-8 font-bold tracking-[-0.01em]">Verification summary</h1></div>
        <dl className="flex flex-wrap gap-x-[22px] gap-y-1">
          <div><dt>Case</dt><dd className="font-mono">{summary.caseRef}</dd></div>
          <div><dt>Made</dt><dd>{dayYearText(summary.madeAt, timeZone)}</dd></div>
          <div><dt>For</dt><dd>{summary.customerName}</dd></div>
        </dl>
      </header>
      <p className="grid grid-cols-[24px_minmax(0,1fr)] gap-3 text-[1.0625rem] leading-6 font-semibold print:text-[0.9375rem] print:leading-5"><Mark kind={verified ? "ok" : "run"} size={24} /><span>{leadSentence(summary)}</span></p>
      {summary.drives.map((drive) => (
        <div key={drive.letter} className="grid gap-[11px]">
          <p><b>{summary.drives.length > 1 ? `Drive ${drive.letter}` : "Your drive"}</b> <span className="font-medium [overflow-wrap:anywhere]">{drive.label}</span>. {ownBoardSentence(drive)}</p>
          {drive.chips.map((chip) => <SummaryChip key={chip.designator} chip={chip} timeZone={timeZone} both={chips.length <= BOTH_STRIPS_TO} />)}
        </div>
      ))}
      <div className="sheet-columns">
        <section>
          <h2>What was done</h2>
          {done.length > 0 ? <ol>{done.map((step, i) => <li key={step.text} className="grid grid-cols-[76px_minmax(0,1fr)] py-0.5"><b className="font-semibold">{step.day === done[i - 1]?.day ? <span className="sr-only">{step.day}</span> : step.day}</b><span>{step.text}</span></li>)}</ol> : <p>Reading has begun; nothing is approved or written yet.</p>}
          {untested ? <p className="pt-1">{untested}</p> : null}
          {summary.twoPersonRule ? null : <p className="pt-1">In this workshop one person may both read and approve: no second person checked the image.</p>}
        </section>
        <section>
          <h2>What this does not promise</h2>
          <ul className="sheet-dashes">
            {promiseLimits(summary).map((limit) => <li key={limit}>{limit}</li>)}
          </ul>
        </section>
        <section className="sheet-back">
          <h2>What comes back to you</h2>
          <p>{comesBackSentence(summary, (iso) => dayYearText(iso, timeZone))} Keep your original board.</p>
        </section>
      </div>
      <footer className="sheet-foot">
        <p><b>What the words mean.</b> A “read” is the whole content of a chip, saved as a file. A “seating” is one time our clip was put on the chip. A “read-back” is a read of the donor chip after the write.{made.length > 0 ? " A “composite” is an image put together from several reads that differ: each bit is what most of them say." : ""} SHA-256 and CRC-32 are check numbers computed from the content: if one bit differed, they would be others.</p>
        <div className="sheet-check">
          <div className="phone:hidden"><Qr text={link} size={84} label="The private link as a square code" /></div>
          <div className="grid content-start gap-[5px]">
            <p><b>Check it yourself.</b> This page by its private link must show these numbers. If somebody reads a donor chip before the drive’s first start, the SHA-256 of that file must equal the one above; drives may rewrite their chips afterwards.</p>
            <p className="font-mono font-semibold [overflow-wrap:anywhere]">{link}</p>
            <p className="text-ink-2">Whoever holds the link sees this page until {dayYearText(summary.expiresAt, timeZone)}. The log and its seal, to compare with later:</p>
          </div>
        </div>
        <dl className="sheet-proofs">
          {summary.drives.map((d) => <div key={d.letter}><dt>Custody log{summary.drives.length > 1 ? ` of Drive ${d.letter}` : ""}, entry {d.head.seq}</dt><dd>{d.head.hash}</dd></div>)}
          {summary.seal ? <><div><dt>Seal {summary.seal.number}</dt><dd>{summary.seal.sha256}</dd></div><div><dt>Key that signed it</dt><dd>{summary.seal.keyId}</dd></div></> : null}
        </dl>
      </footer>
    </main>
  );
}
