import { exactText } from "@/components/ui/times";
import { boardName } from "@/lib/core/board-name";
import { fitText, inGroups, shorten, type WriteTicketSize } from "@/lib/core/paper";
import { countOf, sizeText } from "@/lib/core/quantity";
import type { WriteTicketView } from "@/lib/views";
import { Fact, insideOf, PrintHead, Sheet } from "./sheet";

const STATEMENT: Record<WriteTicketSize, number> = { a6: 80, a5: 420 };

function Void({ ticket, timeZone }: { ticket: WriteTicketView; timeZone: string }) {
  if (!ticket.revoked) return null;
  return (
    <>
      <div className="void-mark" aria-hidden="true">
        <svg viewBox="0 0 100 141" preserveAspectRatio="none"><path d="M2 2l96 137M98 2L2 139" stroke="var(--block)" strokeWidth="1.4" /></svg>
      </div>
      <p className="void-words">Void: don’t write this image. {ticket.revoked.by} revoked the approval on {exactText(ticket.revoked.at, timeZone)}. {shorten(ticket.revoked.reason, 120).text}</p>
    </>
  );
}

/** What goes to the programmer by hand: which image, to which donor, and who cleared it. */
export function WriteTicket({ ticket, size, workshop, timeZone }: { ticket: WriteTicketView; size: WriteTicketSize; workshop: string; timeZone: string }) {
  const { width } = insideOf(size);
  const groups = inGroups(ticket.sha256);
  const { donor } = ticket;
  const name = fitText(ticket.imageName, { width: width - 4, height: 8, largest: size === "a6" ? 9 : 11, smallest: 5 });
  const board = fitText(`${boardName(donor)}, ${donor.designator}`, { width: width - 4, height: 10, largest: 12, smallest: 6 });
  return (
    <Sheet paper={size} label={`Write ticket of ${ticket.designator}`}>
      <div className={`sheet-rows ${size === "a6" ? "!gap-[1.2mm]" : ""}`}>
        <PrintHead workshop={workshop} title="Write ticket" refChecked={ticket.refChecked} code={size === "a6" ? "16mm" : "24mm"} note={`Drive ${ticket.driveLetter}, image of ${ticket.designator}`} />
        <Void ticket={ticket} timeZone={timeZone} />
        {ticket.revoked ? null : <p className="donor-only">Donor board only. Never the original.</p>}
        <dl className="print-facts">
          <Fact name="Write to the donor" wide="w12"><span className="mono font-bold" style={{ fontSize: `${board.points}pt` }}>{board.text}</span></Fact>
          <Fact name="Image" wide="w12"><span className="mono" style={{ fontSize: `${name.points}pt`, wordBreak: "break-all" }}>{name.text}</span></Fact>
          <Fact name="Size" wide="w6">{sizeText(ticket.sizeBytes)}{sizeText(ticket.sizeBytes).endsWith("s") ? "" : `, ${countOf(ticket.sizeBytes, "byte")}`}</Fact>
          <Fact name="Supply" wide="w3"><b>{ticket.supplyMillivolts === null ? "unknown" : `${ticket.supplyMillivolts / 1000} V`}</b></Fact>
          <Fact name="CRC-32" wide="w3"><span className="mono">{ticket.crc32.toUpperCase()}</span></Fact>
        </dl>
        <section>
          <h2>SHA-256 of the image</h2>
          <div className="digest-groups">{groups.map((group, i) => <span key={i}>{group}</span>)}</div>
        </section>
        {ticket.revoked ? null : <div className="last-digits"><span className="cap">Its last 8 digits. Compare them with the file in the programmer before you write.</span><b>{groups[groups.length - 1]}</b></div>}
        <dl className="print-facts">
          <Fact name="Approved by" wide="w6">{shorten(ticket.approvedBy, 60).text}{ticket.twoPersonRule ? "" : " (two-person rule switched off)"}</Fact>
          <Fact name="On" wide="w6">{exactText(ticket.approvedAt, timeZone)}</Fact>
          <Fact name="Statement" wide="w12">{shorten(ticket.statement, STATEMENT[size]).text}{ticket.composite ? " The image is a composite: put together from several reads." : ""}</Fact>
          {ticket.together ? <Fact name="Moved together" wide="w12">{shorten(ticket.together, STATEMENT[size]).text}</Fact> : null}
          <Fact name="Programmer" wide="w6">{ticket.programmer ? shorten(ticket.programmer, 40).text : null}</Fact>
          <Fact name="Written by, day and time" wide="w6" />
        </dl>
        <p className="foot">{ticket.encrypted ? "Encrypted drive: keep the enclosure’s small board and the drive together; this image may hold key material. " : ""}Look whether the approval still stands before you write: this paper does not change when it is revoked.</p>
      </div>
    </Sheet>
  );
}
