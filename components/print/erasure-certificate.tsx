import { exactText } from "@/components/ui/times";
import { driveLabel } from "@/lib/core/drive-label";
import { countOf, withCommas } from "@/lib/core/quantity";
import type { ErasureItemView, ErasureView, PrintCaseView } from "@/lib/views";
import { Fact, PrintHead, Sheet } from "./sheet";

const CAUSE = { due: "The time for which they were to be kept was over", "asked-for": "The customer asked for it" } as const;

function Rows({ items, name }: { items: ErasureItemView[]; name: string }) {
  return (
    <table className="print-table">
      <caption className="sr-only">{name}</caption>
      <thead><tr><th scope="col" style={{ width: "38%" }}>What it was kept as</th><th scope="col" style={{ width: "13%" }}>Bytes</th><th scope="col">SHA-256</th></tr></thead>
      <tbody>{items.map((item) => <tr key={item.sha256}><td>{item.names.join("; ")}</td><td className="mono">{withCommas(item.sizeBytes)}</td><td className="mono">{item.sha256.slice(0, 32)}<wbr />{item.sha256.slice(32)}</td></tr>)}</tbody>
    </table>
  );
}

/** A4, over as many pages as the images need: what was erased, how, by whom, and what that does not reach. */
export function ErasureCertificate({ view, erasure }: { view: PrintCaseView; erasure: ErasureView["erasures"][number] }) {
  const { case: job, timeZone } = view;
  return (
    <Sheet paper="a4" flows label="Certificate of erasure">
      <div className="sheet-rows">
        <PrintHead workshop={view.workshop} title="Certificate of erasure" refChecked={job.refChecked} note={view.workshopAddress.join(", ")} />
        <dl className="print-facts">
          <Fact name="Customer" wide="w6">{job.customer.name}</Fact>
          <Fact name="Drives" wide="w6">{job.drives.map((drive) => `Drive ${drive.letter}${driveLabel(drive) ? `, ${driveLabel(drive)}` : ""}`).join("\n") || "none recorded"}</Fact>
          <Fact name="Erased" wide="w6">{exactText(erasure.at, timeZone)} ({timeZone})</Fact>
          <Fact name="By" wide="w6">{erasure.by.name}</Fact>
          <Fact name="Why" wide="w12">{`${CAUSE[erasure.cause]}.\n${erasure.reason}`}</Fact>
          <Fact name="How" wide="w12">The stored bytes, and every copy of them in Twinread’s store, were removed. Each removal is a signed entry in the custody log, under the erasure {erasure.id}.</Fact>
        </dl>
        <section>
          <h2>What was erased: {countOf(erasure.erased.length, "file")}, {withCommas(erasure.bytes)} bytes</h2>
          {erasure.erased.length > 0 ? <Rows items={erasure.erased} name="What was erased" /> : <p>None: everything of this case is used elsewhere too.</p>}
        </section>
        {erasure.kept.length > 0 ? (
          <section>
            <h2>What stays stored: {countOf(erasure.kept.length, "file")}</h2>
            <p>Exactly the same bytes belong to other work of the workshop. They are no longer kept for this case and go when that work is erased.</p>
            <Rows items={erasure.kept} name="What stays stored" />
          </section>
        ) : null}
        <section>
          <h2>What this does not reach</h2>
          <ul className="erasure-limits">
            <li>The chips on the boards: they hold what they held.</li>
            <li>Case bundles and images that left the workshop before.</li>
            <li>Backups of the workshop, until they run out. The workshop writes here how long that is: <span className="write-line" /></li>
            <li>The custody log: it keeps sizes and digests. No image can be made from a digest.</li>
          </ul>
        </section>
        <div className="sign-lines"><span>For the workshop, signature</span><span>Day</span></div>
        <p className="foot">Printed {exactText(view.printedAt, timeZone)}. Compare any file with a digest above: sha256sum FILE.</p>
      </div>
    </Sheet>
  );
}
