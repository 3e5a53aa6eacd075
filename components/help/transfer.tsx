import { DEFAULT_POLICY } from "@/lib/core/words";
import { CautionList } from "./caution-list";
import { Part, Points, See, Steps, Unsourced } from "./prose";

export function TransferHelp() {
  return (
    <>
      <CautionList of={["wrongImage", "original", "donor", "voltage", "power", "fumes"]} />
      <Part title="Two ways, one rule">
        <p>Either the approved image is <b>written</b> to the donor’s chip, or the chip itself is <b>moved</b> to the donor board. Both need the same approval first: a chip that is moved can be lost on the way, and the saved image is then all there is. Both are read back the same way.</p>
      </Part>
      <Part title="Writing the image" id="write">
        <Steps>
          <li>Print the write ticket, or keep the chip’s page open: donor board, designator, supply, and the last eight digits of the digest.</li>
          <li>Download the approved image. The download is written into the log before its first byte leaves.</li>
          <li>Put the clip on the <b>donor’s</b> chip. Compare the label’s shape and the designator with the ticket.</li>
          <li>Note the protect bits and clear them if they are set. Erase, and check that the chip reads all FF<Unsourced />.</li>
          <li>Write, with the chip’s own type and page size set in the programmer.</li>
          <li>Record the transfer on the chip’s page. Only then can read-backs be sent.</li>
        </Steps>
      </Part>
      <Part title="Moving the chip" id="move">
        <Steps>
          <li>Take a photo of both chips in place; pin 1 must be seen.</li>
          <li>Take the donor’s chip off and label it. Its content is saved already.</li>
          <li>Take the original’s chip off, turn it as it was, and solder it to the donor board. One chip after the other where a board has two.</li>
          <li>Look at every leg under a lens, then record the transfer as “chip moved”.</li>
        </Steps>
      </Part>
      <Part title="Reading back" id="read-back">
        <p>Take the clip off and put it on again, then read the donor’s chip as a read-back. At first {DEFAULT_POLICY.readBacks} equal read-backs in {DEFAULT_POLICY.readBackSeatings} seatings are asked for. Each is compared with the approved image, byte for byte; the programmer’s own “verify” counts for nothing here, because it ran with the same clip in the same seat.</p>
        <p>When enough of them equal the image and none differs, the chip is <b>verified</b>.</p>
      </Part>
      <Part title="When a read-back differs">
        <p>The finding says how the write went wrong where the bytes tell: <See topic="findings" at="write-refused">nothing was written</See>, <See topic="findings" at="not-erased">not erased</See>, <See topic="findings" at="erased-only">a sector stayed erased</See>, <See topic="findings" at="partly-protected">a part is protected</See>, <See topic="findings" at="page-wrap">wrong page size</See>, <See topic="findings" at="other-image">the wrong file</See>.</p>
        <Points>
          <li>If the clip sat badly: seat it anew and read back once more. A lead may set the bad read-back aside, with the reason.</li>
          <li>If the write went wrong: put right what the finding names, write again, and record that as a new transfer. The count starts afresh.</li>
        </Points>
      </Part>
      <Part title="After the first power-on">
        <p>Drives write to their chips when they run. A read-back that was taken after the drive’s first start with this board and differs is therefore a note, and no fault of the write. So read back before you start a written board. A moved chip may be started first.</p>
      </Part>
    </>
  );
}
