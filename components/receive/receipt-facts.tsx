import { Note } from "@/components/ui/note";
import { momentText } from "@/components/ui/times";
import { SEAL_WORDS, SMALL_BOARD_WORDS } from "@/lib/core/receipt-words";
import type { ReceiptView } from "@/lib/views";

function Fact({ name, children }: { name: string; children: string | null }) {
  return children ? <div className="min-w-0"><dt className="text-t1 text-ink-2">{name}</dt><dd className="break-words whitespace-pre-line">{children}</dd></div> : null;
}

/** What was found when the parcel came. */
export function ReceiptFacts({ receipt, timeZone }: { receipt: ReceiptView; timeZone: string }) {
  const odd = [receipt.sealAsSent === "no" ? "The seal is not as it was sent." : null, receipt.smallBoard === "no" ? "The enclosure’s small board is not here. Ask the customer for it before any work: it may hold the key to the data." : null, receipt.differs ? `${receipt.differs}.` : null].filter((one) => one !== null);
  return (
    <div className="grid gap-3">
      {odd.length > 0 ? <Note kind="caution" title="The parcel is not as the request said.">{odd.map((one) => <p key={one}>{one}</p>)}</Note> : null}
      <dl className="grid grid-cols-3 gap-x-6 gap-y-3 phone:grid-cols-1">
        <Fact name="Received by">{`${receipt.by.name}, ${momentText(receipt.at, timeZone)}`}</Fact>
        <Fact name="Seal">{`${SEAL_WORDS[receipt.sealAsSent]}${receipt.sealNumber ? `, ${receipt.sealNumber}` : ""}`}</Fact>
        <Fact name="Enclosure’s small board">{SMALL_BOARD_WORDS[receipt.smallBoard]}</Fact>
        <Fact name="Condition">{receipt.parcelCondition}</Fact>
        <Fact name="Carrier">{[receipt.carrier, receipt.tracking].filter(Boolean).join(", ") || "brought in person"}</Fact>
        <Fact name="Also came">{receipt.accessories}</Fact>
      </dl>
    </div>
  );
}
