import { exactText } from "@/components/ui/times";
import { driveLabel } from "@/lib/core/drive-label";
import { shorten } from "@/lib/core/paper";
import { SEAL_WORDS, SMALL_BOARD_WORDS } from "@/lib/core/receipt-words";
import type { PrintCaseView } from "@/lib/views";
import { Fact, PrintHead, Sheet } from "./sheet";

/** A5: for whoever brings the parcel in person. What is not on record yet is left open for a hand. */
export function ReceiptSheet({ view }: { view: PrintCaseView }) {
  const { case: job, receipt, timeZone } = view;
  const drives = job.drives.map((drive) => `Drive ${drive.letter}, ${driveLabel(drive)}`).join("\n");
  return (
    <Sheet paper="a5" flows label="Receipt">
      <div className="sheet-rows">
        <PrintHead workshop={view.workshop} title="Receipt" refChecked={job.refChecked} note={view.workshopAddress.join(", ")} />
        <p>We have received what is listed here. Keep this paper: its number fetches the job back.</p>
        <dl className="print-facts">
          <Fact name="From" wide="w6">{job.customer.name}{view.company ? `\n${view.company}` : ""}</Fact>
          <Fact name="Received" wide="w6">{job.receivedAt ? `${exactText(job.receivedAt, timeZone)}${receipt ? `\nby ${receipt.by.name}` : job.createdBy ? `\nby ${job.createdBy.name}` : ""}` : null}</Fact>
          <Fact name="What was brought" wide="w12">{drives || null}</Fact>
          <Fact name="Condition" wide="w12">{receipt ? shorten(receipt.parcelCondition, 700).text : null}</Fact>
          <Fact name="Seal" wide="w6">{receipt ? `${SEAL_WORDS[receipt.sealAsSent]}${receipt.sealNumber ? `, ${receipt.sealNumber}` : ""}` : null}</Fact>
          <Fact name="Enclosure’s small board" wide="w6">{receipt ? SMALL_BOARD_WORDS[receipt.smallBoard] : null}</Fact>
          <Fact name="Carrier, tracking" wide="w6">{receipt ? [receipt.carrier, receipt.tracking].filter(Boolean).join(", ") || "brought in person" : null}</Fact>
          <Fact name="Also came" wide="w6">{receipt ? shorten(receipt.accessories ?? "nothing else", 300).text : null}</Fact>
          {receipt?.differs ? <Fact name="Not as the request said" wide="w12">{shorten(receipt.differs, 500).text}</Fact> : null}
        </dl>
        <div className="sign-lines"><span>For the workshop</span><span>Day</span></div>
        <div className="sign-lines !pt-[9mm]"><span>Handed over by</span><span>Day</span></div>
        <p className="foot">Nothing is ever written to your own board. Ask for the case by its number, {job.refChecked}.</p>
      </div>
    </Sheet>
  );
}
