import Link from "next/link";
import { CautionList } from "./caution-list";
import { Part, Points, See, Steps } from "./prose";

export function RequestHelp() {
  return (
    <>
      <CautionList of={["smallBoard", "static", "consent"]} />
      <Part title="What the customer does">
        <p>The customer fills in the <Link href="/request" prefetch={false}>public form</Link>; no account is needed. It asks for what stands on the drive’s label (for an external drive the part number on the enclosure is enough), what happened, what was tried, where the parcel goes back to, and for the customer’s leave: that they own the drive or act for the owner, and that chips may be read, written and soldered.</p>
        <p>At the end there is a case number and a slip to print. The slip goes into the parcel. A private link shows how far the case is, in plain words, and lets the customer ask for deletion or withdraw the request. Whoever has the link sees that page, so it should be kept like a key.</p>
      </Part>
      <Part title="The case number" note="The same number from request to return.">
        <p>A number such as <code>26-0042</code> is the year and a count. On slips and labels a check character follows after a dot (ISO 7064 MOD 37,36): it shows when one character was mistyped. Both forms can be typed everywhere. The square code on a label holds this number and nothing else.</p>
      </Part>
      <Part title="How to pack">
        <Points>
          <li>Leave the board on the drive. Don’t power it again: each try can spoil the chips further.</li>
          <li>The drive goes into an antistatic bag, and that into padding on all sides.</li>
          <li>Send the enclosure and its small board too.</li>
          <li>Put the slip inside. If the parcel carries a seal, its number goes on the slip.</li>
        </Points>
      </Part>
      <Part title="When the parcel comes" note="On the page Receive.">
        <Steps>
          <li>Scan the code on the slip, or type the number. The request opens beside what you hold.</li>
          <li>Before anything is taken apart, take photos: parcel, seal, label, both sides of the board, the connector.</li>
          <li>Compare line by line: is it what the request says? What differs is written down, it refuses nothing.</li>
          <li>Note carrier, tracking number, seal and condition, and whether the enclosure’s small board is there.</li>
          <li>Record the receipt, then print the labels and the job ticket. Original and donor have labels of different shape; stick them on before a board leaves its drive.</li>
        </Steps>
      </Part>
      <Part title="A case without a request">
        <p>A drive that is handed over at the desk gets its case on the page Cases. It counts as received from that moment; condition, seal and what came along can be recorded once afterwards.</p>
      </Part>
      <Part title="Waiting">
        <p>A case that can’t go on is put on hold, with a reason and whom or what it waits for. The bench shows since when. Next: <See topic="identify">identify and record</See>.</p>
      </Part>
    </>
  );
}
