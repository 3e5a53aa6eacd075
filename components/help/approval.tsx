import { approvalConditions } from "@/lib/core/approval";
import { DEFAULT_POLICY } from "@/lib/core/words";
import { CautionList } from "./caution-list";
import { Part, Points, See, Steps } from "./prose";

/** The rules themselves, as the approval section of a chip that has no read yet would list them. */
const RULES = approvalConditions({
  policy: DEFAULT_POLICY, sizeBytes: 1, reads: [], approval: null, transfer: null, donor: null, chainClean: true, takers: [], imageSound: true,
}).map(({ key, rule }) => ({ key, rule }));

export function ApprovalHelp() {
  return (
    <>
      <CautionList of={["wrongImage", "donor"]} />
      <Part title="What an approval is">
        <p>A lead says, with name and time: this image, of this chip, may go to this donor chip. From then on a technician may download the image and write it, or move the chip. Nothing else hands an image of the original to a technician.</p>
      </Part>
      <Part title="What has to be so" note="The list of the chip’s page, with the numbers that a workshop starts with.">
        <Points>{RULES.map(({ key, rule }) => <li key={key}>{rule}.</li>)}</Points>
        <p>A finding that <b>blocks</b> can’t be argued away: take other reads. One that <b>needs a reason</b> can be answered by the lead, in writing, one text for each.</p>
      </Part>
      <Part title="How it goes">
        <Steps>
          <li>When nothing stands against it, a technician asks for approval on the chip’s page.</li>
          <li>A lead opens the decision sheet: what speaks for the image at the left, what against at the right. Each point against it is ticked as looked at.</li>
          <li>The lead types the last eight digits of the digest, from the sheet, and says why the image may be written.</li>
          <li>Or sends it back, with what is missing.</li>
        </Steps>
      </Part>
      <Part title="Two people" id="two-people">
        <p>Whoever took a read of the original, set aside or not, can’t approve its image. The page names who can. A workshop of one person may switch this off on the page Policy; every approval, log, bundle and summary then says so.</p>
      </Part>
      <Part title="What takes it back">
        <Points>
          <li>A lead, with a reason.</li>
          <li>A later read that differs, or reads set aside until too few are left.</li>
          <li>Another size of the chip, or another pair.</li>
          <li>A stored image that is found damaged or missing.</li>
          <li>The approver turns out to have taken a read of the chip.</li>
        </Points>
        <p>If the image was written already, the chip goes to “Write again”: the donor holds an image that nobody clears any more.</p>
      </Part>
      <Part title="When the log is not clean">
        <p>If the check of the drive’s custody log finds something, approval, hand-out and transfer wait until an auditor has looked at it and recorded an assessment. Reads can still be added. See <See topic="custody" at="not-clean">the custody log</See>.</p>
      </Part>
    </>
  );
}
