import { CLOSED_KINDS, DEFAULT_POLICY, type ClosedKind } from "@/lib/core/words";
import { CautionList } from "./caution-list";
import { HelpTable, Part, Points, See, Steps, WidePart } from "./prose";

const KIND: Record<ClosedKind, { word: string; text: string }> = {
  returned: { word: "Returned", text: "The work is done and everything went back. The return is recorded first." },
  "without-transfer": { word: "Ended without a transfer", text: "No image was moved, or none could be verified. A reason is needed." },
  cancelled: { word: "Cancelled", text: "The customer or the workshop called it off. A reason is needed." },
};

export function ReturnHelp() {
  return (
    <>
      <CautionList of={["smallBoard", "wrongImage", "consent"]} />
      <Part title="Fit and test">
        <Steps>
          <li>Read back first. A written board is started only when its chips are verified.</li>
          <li>Fit the donor board to the drive it was written for; compare the labels on both.</li>
          <li>Start it and record the test: does it spin, does it get ready, which serial does it report, how many tries.</li>
          <li>If the serial it reports is not the label’s, stop. Either the wrong image is on the board, or the wrong board is on the drive.</li>
        </Steps>
        <p>A drive that doesn’t start isn’t proof of a bad transfer, and one that starts isn’t proof that its data can be read.</p>
      </Part>
      <Part title="What goes back">
        <p>The return form lists what is on record: drive, donor board, original board, removed chips, the enclosure with its small board, and what else came along. Tick what is in the parcel, note carrier, tracking number and seal, and print the return slip.</p>
      </Part>
      <Part title="The summary">
        <p>The customer gets one sheet by private link: what was read, what was written or moved, that both are equal with digests in full, how the start-up test ended, what comes back, and what it does not promise. It says what was done as it was done. A lead sends it; the link can be withdrawn and ends after {DEFAULT_POLICY.shareDays} days at first.</p>
      </Part>
      <WidePart title="Closing">
        <HelpTable caption="How a case can end" head={["Ends as", "When"]} rows={CLOSED_KINDS.map((key) => ({ key, cells: [KIND[key].word, KIND[key].text] }))} />
        <div className="mt-3 grid max-w-[53ch] gap-3 text-t4">
          <p>A lead closes a case. While a chip that needs a transfer is not verified, a reason is needed whatever the ending. A closed case is kept as it is: notes can still be added, anything else needs it reopened.</p>
        </div>
      </WidePart>
      <Part title="What stays, and how long">
        <Points>
          <li>Images fall due for erasure some days after the return ({DEFAULT_POLICY.erasureDays} at first), and never later than the customer agreed to. A lead may keep them until another day, with a reason.</li>
          <li>Nothing erases by itself. A lead or an admin erases, on the page of the closed case, from that day on or when the customer asks for it on their private page.</li>
          <li>Each erasure is a signed entry, and a certificate of it can be printed. Digests and the log stay; they hold no image and no name.</li>
        </Points>
        <p>The whole case can go out as a <See topic="custody" at="bundle">bundle</See> first.</p>
      </Part>
    </>
  );
}
