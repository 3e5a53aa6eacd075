import type { ReactNode } from "react";
import { Qr } from "@/components/print/qr";
import { consentWords, CONSENTS, DAMAGE_WORDS } from "@/lib/core/request-words";
import type { RequestSlipView } from "@/lib/views";

/** Boxes that fit into the slip's width; what is longer is written on a line. */
const MOST_BOXES = 24;

/** A number in boxes, one character each, as printed on the label; empty boxes for correcting by hand. */
function Combs({ term, text, least }: { term: string; text: string | null | undefined; least: number }) {
  const typed = [...(text ?? "")];
  const long = typed.length > MOST_BOXES;
  const cells = [...typed, ...Array<string>(Math.max(0, least - typed.length)).fill("")];
  return (
    <dl>
      <dt>{term}</dt>
      {long ? <dd className="slip-write"><span className="cut cut-1">{text}</span></dd> : (
        <dd className="slip-combs"><span className="sr-only">{text ?? "to be filled in"}</span>{cells.map((cell, i) => <span key={i} aria-hidden="true" className={cell === " " || cell === "-" ? "gap" : ""}>{cell}</span>)}</dd>
      )}
    </dl>
  );
}

function CaseNumber({ refChecked, above, below }: { refChecked: string; above: string; below?: string }) {
  const [ref, check] = refChecked.split(".");
  return (
    <div className="slip-number">
      <div><span className="text-ink-2">{above}</span><b>{ref}<i>.{check}</i></b>{below ? <span>{below}</span> : null}</div>
      <Qr text={refChecked} size={84} label="The case number as a square code" />
    </div>
  );
}

const TickLine = ({ children }: { children: ReactNode }) => <div className="slip-tick"><i /><span>{children}</span></div>;

/** The page that travels with the board: one sheet of A4, its lower part the address label. */
export function Slip({ view }: { view: RequestSlipView }) {
  const { answers: a, workshop, address, refChecked } = view;
  return (
    <main id="main" tabIndex={-1} className="slip outline-none">
      <header className="slip-head">
        <div><p className="font-semibold text-copper">{workshop}</p><h1 className="text-[1.75rem] leading-8 font-bold tracking-[-0.01em]">Slip for the parcel</h1></div>
        <CaseNumber refChecked={refChecked} above="Case, one number from request to return" />
      </header>
      <dl className="slip-facts">
        <div><dt>From</dt><dd className="cut" dir="auto">{a.name}</dd>{a.company ? <dd className="cut cut-1" dir="auto">{a.company}</dd> : null}</div>
        <div><dt>Reach by</dt><dd className="cut">{a.email}</dd>{a.phone ? <dd className="cut cut-1">{a.phone}</dd> : null}</div>
        <div><dt>Damage</dt><dd>{DAMAGE_WORDS[a.damage]}</dd>{a.tried ? <dd className="cut" dir="auto">{a.tried}</dd> : null}</div>
      </dl>
      <section className="grid gap-[11px]">
        <h2 className="!mb-0">What is in the parcel</h2>
        <div className="grid gap-[11px]">
          <Combs term="Part number on the enclosure" text={a.partNumber} least={12} />
          <Combs term="Serial number" text={a.serial} least={15} />
          <div className="flex flex-wrap gap-x-7 gap-y-[11px]"><Combs term="Board number" text={a.boardNumber} least={12} /><Combs term="Revision" text={a.boardRevision} least={3} /></div>
        </div>
        <p className="text-ink-2">Correct anything that’s wrong by hand. Write <b className="font-mono text-ink">0</b> (zero) with a stroke, <b className="font-mono text-ink">O</b> (letter) without; cross the stem of <b className="font-mono text-ink">8</b> clearly, give <b className="font-mono text-ink">B</b> and <b className="font-mono text-ink">D</b> square backs.</p>
      </section>
      <div className="slip-columns">
        <section>
          <h2>Before you close it</h2>
          <TickLine>Drive or board in an anti-static bag</TickLine>
          <TickLine><b>The enclosure with its small board, too:</b> it may hold the key to your data</TickLine>
          <TickLine>Only cables and screws stay at home</TickLine>
          <TickLine>At least 5 cm of padding on every side</TickLine>
          <TickLine>This slip on top, not in the bag</TickLine>
          <TickLine>Parcel sealed; the seal’s number written here:</TickLine>
          <div className="slip-write mt-1 ml-[25px]" />
        </section>
        <section>
          <h2>Your leave to do the work</h2>
          <p>{CONSENTS.map((consent) => consentWords(consent, a.keepDays)).join(" ")}</p>
          <p className="cut cut-1 pt-1 text-ink-2" dir="auto">Typed on the form: {a.signature}</p>
          <div className="grid grid-cols-[1fr_110px] gap-4 pt-6"><div className="border-t border-ink pt-0.5">Signature</div><div className="border-t border-ink pt-0.5">Date</div></div>
        </section>
      </div>
      <section className="border-t border-rule-2 pt-2.5">
        <h2>Filled in at the bench</h2>
        <dl className="slip-four">{["Received, day and time", "Seal as sent?", "Enclosure, small board here?", "By"].map((term) => <div key={term}><dt>{term}</dt><dd className="slip-write" /></div>)}</dl>
      </section>
      <section className="slip-know"><h2>Anything the bench should know</h2><div className="slip-write" /><div className="slip-write" /></section>
      <div className="slip-cut"><span>cut here, stick on the outside</span></div>
      <section className="slip-to" aria-label="Address label">
        <address className={address.length > 3 ? "!text-t4 !leading-5" : ""}>{[workshop, ...address].map((one, i) => <div key={i}>{one}</div>)}{address.length === 0 ? <><div className="slip-write" /><div className="slip-write" /></> : null}</address>
        <CaseNumber refChecked={refChecked} above="Case" below="Fragile: magnetic storage" />
      </section>
    </main>
  );
}
