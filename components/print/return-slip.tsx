import { dayYearText } from "@/components/ui/times";
import { boardName } from "@/lib/core/board-name";
import { driveLabel } from "@/lib/core/drive-label";
import { encryptionCaution } from "@/lib/core/encryption";
import { shorten } from "@/lib/core/paper";
import type { PrintCaseView } from "@/lib/views";
import { Fact, PrintHead, Sheet } from "./sheet";

/** What would go back if nobody has recorded it yet: to be ticked by hand. */
function expected({ case: job, receipt }: PrintCaseView): string[] {
  const boards = job.drives.flatMap((drive) => [
    `Drive ${drive.letter}${driveLabel(drive) ? `, ${driveLabel(drive)}` : ""}`,
    ...drive.boards.filter((board) => board.role === "original").map((board) => `Original board of Drive ${drive.letter}, ${boardName(board)}`),
  ]);
  return [...boards, ...(receipt?.smallBoard === "yes" ? ["Enclosure with its small board"] : []), ...(receipt?.accessories ? [shorten(receipt.accessories, 300).text] : [])];
}

/** A4: lies on top in the parcel, or is signed at the desk. */
export function ReturnSlip({ view }: { view: PrintCaseView }) {
  const { case: job, returned, timeZone } = view;
  const encrypted = job.drives.some((drive) => encryptionCaution(drive.encryption) !== null);
  const items = returned ? returned.items : expected(view);
  return (
    <Sheet paper="a4" flows label="Return slip">
      <div className="sheet-rows">
        <PrintHead workshop={view.workshop} title="Return slip" refChecked={job.refChecked} note={view.workshopAddress.join(", ")} />
        <dl className="print-facts">
          <Fact name="To" wide="w6">{returned?.toPerson ?? job.customer.name}{view.company ? `\n${view.company}` : ""}{view.returnAddress ? `\n${view.returnAddress}` : ""}</Fact>
          <Fact name="Sent or handed over on" wide="w3">{returned ? dayYearText(returned.at, timeZone) : null}</Fact>
          <Fact name="Packed by" wide="w3">{returned?.by.name}</Fact>
          <Fact name="Number of the seal" wide="w3"><span className="mono">{returned?.sealNumber}</span></Fact>
          <Fact name="Carrier" wide="w3">{returned?.carrier}</Fact>
          <Fact name="Tracking number" wide="w6">{returned?.tracking ? <span className="mono">{returned.tracking}</span> : null}</Fact>
        </dl>
        <section>
          <h2>What goes back</h2>
          <ul className="tick-list">
            {items.map((item, i) => <li key={i} className={returned ? "has" : ""}><span>{item}</span></li>)}
            {returned ? null : Array.from({ length: 4 }, (_, i) => <li key={`free-${i}`}><span className="write-line" /></li>)}
          </ul>
          {returned?.note ? <p className="mt-2">{shorten(returned.note, 800).text}</p> : null}
        </section>
        <section>
          <h2>When you open it</h2>
          <ul className="tick-list">
            <li><span>Compare the seal’s number with the one above. If it differs, or the seal is broken, leave the parcel closed and tell us.</span></li>
            <li><span>Compare what is inside with the list, and tell us within a few days if something is missing.</span></li>
            {encrypted ? <li><span>Keep the enclosure’s small board and the drive together: the small board may hold the key to your data.</span></li> : null}
            <li><span>Copy your data to another drive first. The transfer lets the drive start; it does not make it new.</span></li>
            <li><span>Keep the original board: nothing else holds its data once our copy is erased.</span></li>
          </ul>
        </section>
        <div className="sign-lines"><span>Received complete, signature</span><span>Day</span></div>
        <p className="foot">{view.workshop}{view.workshopAddress.length > 0 ? `, ${view.workshopAddress.join(", ")}` : ""}. Name the case number {job.refChecked} when you write to us.</p>
      </div>
    </Sheet>
  );
}
