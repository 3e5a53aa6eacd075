import { dayYearText, dueText, momentText } from "@/components/ui/times";
import { boardName } from "@/lib/core/board-name";
import { driveLabel } from "@/lib/core/drive-label";
import { encryptionCaution } from "@/lib/core/encryption";
import { shorten } from "@/lib/core/paper";
import { countOf, sizeText } from "@/lib/core/quantity";
import type { DriveView, PrintCaseView } from "@/lib/views";
import { Cautions } from "./cautions";
import { Fact, PrintHead, Sheet } from "./sheet";

/** Characters of prose on a small sheet; the whole text is on the case's page. */
const PROSE = 700;
const MORE = "(the rest is on the case’s page)";

function Prose({ text }: { text: string }) {
  const cut = shorten(text, PROSE);
  return <>{cut.text}{cut.shortened ? ` ${MORE}` : ""}</>;
}

function DriveRows({ drive }: { drive: DriveView }) {
  const chips = drive.boards.flatMap((board) => board.chips.map((chip) => ({ board, chip })));
  return (
    <>
      <tr><td className="font-bold">Drive {drive.letter}</td><td colSpan={3} className="mono">{driveLabel(drive)}</td></tr>
      {drive.boards.filter((board) => board.chips.length === 0).map((board) => <tr key={board.id}><td /><td>{board.role}</td><td className="mono" colSpan={2}>{boardName(board)}, no chip recorded</td></tr>)}
      {chips.map(({ board, chip }) => (
        <tr key={chip.id}>
          <td className="mono font-bold">{chip.designator}</td>
          <td>{board.role}</td>
          <td className="mono">{boardName(board)}</td>
          <td>{sizeText(chip.sizeBytes)}, {chip.supplyMillivolts === null ? "supply unknown" : `${chip.supplyMillivolts / 1000} V`}{chip.needsTransfer || board.role === "donor" ? "" : ", kept for reference"}</td>
        </tr>
      ))}
    </>
  );
}

/** A5: goes with the job over the bench. Who, what, cautions, due, boxes to tick. */
export function JobTicket({ view }: { view: PrintCaseView }) {
  const { case: job, policy, timeZone } = view;
  const encrypted = job.drives.some((drive) => encryptionCaution(drive.encryption) !== null);
  const steps = [
    "Parcel received, four photos: label, board top, board bottom, connector", "Labels on bag, drive, both boards and trays",
    "Supply voltage of each chip looked up and set", "Donor’s content saved: two equal reads",
    `${countOf(policy.reads, "read")} equal in ${countOf(policy.seatings, "seating")}`, "Image approved by a lead, write ticket printed",
    "Written to the donor, or the chip moved", `${countOf(policy.readBacks, "read-back")} equal in ${countOf(policy.readBackSeatings, "seating")}`,
    "Fitted and tested: spins, ready, reports the label’s serial", "Packed and sealed, return slip on top",
  ];
  return (
    <Sheet paper="a5" flows label="Job ticket">
      <div className="sheet-rows">
        <PrintHead workshop={view.workshop} title="Job ticket" refChecked={job.refChecked} />
        <dl className="print-facts">
          <Fact name="Customer">{job.customer.name}{view.company ? `\n${view.company}` : ""}{job.customer.contact ? `\n${job.customer.contact}` : ""}</Fact>
          <Fact name="Received">{job.receivedAt ? momentText(job.receivedAt, timeZone) : "not yet"}{job.createdBy ? `\nby ${job.createdBy.name}` : ""}</Fact>
          <Fact name="Due">{job.dueOn ? dueText(job.dueOn) : "no date"}</Fact>
          <Fact name="Damage" wide="w12"><Prose text={job.damage} /></Fact>
          {job.note ? <Fact name="Bench note" wide="w12"><Prose text={job.note} /></Fact> : null}
        </dl>
        <section>
          <h2>What is to be done</h2>
          {job.drives.length > 0 ? (
            <table className="print-table">
              <colgroup><col style={{ width: "15mm" }} /><col style={{ width: "15mm" }} /><col /><col style={{ width: "36mm" }} /></colgroup>
              <thead><tr><th scope="col">Chip</th><th scope="col">Board</th><th scope="col">Board number</th><th scope="col">Size, supply</th></tr></thead>
              <tbody>{job.drives.map((drive) => <DriveRows key={drive.id} drive={drive} />)}</tbody>
            </table>
          ) : <p>No drive is recorded yet: record what its label says first.</p>}
        </section>
        <section><h2>Mind</h2><Cautions of={["static", "power", "supply", "heat", "original", "donor", encrypted ? "encrypted" : "enclosure"]} /></section>
        <section><h2>Tick when done</h2><ul className="tick-list grid-cols-2">{steps.map((step) => <li key={step}><span>{step}</span></li>)}</ul></section>
        <p className="foot">Printed {dayYearText(view.printedAt, timeZone)}. What the screen says counts: this paper does not change with it.</p>
      </div>
    </Sheet>
  );
}
