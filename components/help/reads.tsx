import { DEFAULT_POLICY } from "@/lib/core/words";
import { CautionList } from "./caution-list";
import { Part, Points, See, Steps, Unsourced } from "./prose";

export function ReadsHelp() {
  return (
    <>
      <CautionList of={["static", "power", "voltage", "original", "heat"]} />
      <Part title="Before the clip goes on">
        <Steps>
          <li>Unplug drive, board and enclosure. Wear the wrist strap.</li>
          <li>Read the chip’s marking and look its supply up. Set that supply in the reader, and set the reader to read.</li>
          <li>Find pin 1: a dot, a notch or a bevelled edge marks it. The red wire of most clips is pin 1<Unsourced />.</li>
          <li>Clean the pins. Flux, lacquer and oxide are the commonest cause of reads that differ<Unsourced />.</li>
          <li>Clip on, straight and to the end, and read the chip’s id. FF FF FF or 00 00 00 means that the clip isn’t on, pin 1 is elsewhere, or the chip has no supply.</li>
        </Steps>
      </Part>
      <Part title="How many reads">
        <p>At first {DEFAULT_POLICY.reads} equal reads in {DEFAULT_POLICY.seatings} seatings are asked for; what your workshop asks for stands on the page Policy. Reads count from the first one: take all that are asked for, not until two happen to agree.</p>
        <p>A <b>seating</b> is one time the clip was put on, or the chip was put into its socket; on screen it is a letter. Take the clip off, clean, put it on again: that is the next letter. A clip that sits wrong gives the same wrong image every time, so reads of one seating say little about each other.</p>
      </Part>
      <Part title="Sending them">
        <Points>
          <li>Drop the files on the chip’s page as the reader wrote them. Nothing is trimmed, padded or converted unseen.</li>
          <li>Say reader, method, supply and seating. What you said last is filled in; change what changed.</li>
          <li>The page works the digests out before it sends, and the server must come to the same, or nothing is stored.</li>
          <li>Text files (Intel HEX, Motorola S-record) need base, size and fill. They are asked for, never guessed, because a wrong base shifts the whole image.</li>
          <li>A read is never changed and never deleted. One of the wrong chip is set aside, and sent again to the right one.</li>
        </Points>
      </Part>
      <Part title="In place or lifted">
        <p>Read in place first. The board’s controller hangs on the same lines: hold it in reset if you can, and say in the form whether it was held. If reads stay unsure, the chip can be lifted and read in a socket, with the customer’s leave and the lead’s word.</p>
      </Part>
      <Part title="When a chip is hard to read" note="Try one thing at a time.">
        <Points>
          <li>Lower the clock to a tenth and use the shortest leads you have<Unsourced />.</li>
          <li>Put 100 nF across the supply, right at the chip<Unsourced />.</li>
          <li>Tie the hold and write-protect pins to the supply<Unsourced />.</li>
          <li>Use another USB port or cable, or smaller blocks, when whole stretches shift<Unsourced />.</li>
          <li>Measure the supply at the chip while it is read. The board may draw more than the reader gives.</li>
        </Points>
      </Part>
      <Part title="The donor’s own content" id="donor">
        <p>Before anything is written to the donor’s chip, save what it holds: two equal full-size reads, one seating is enough. Any content will do, a blank chip too. Without it an approval is refused, because afterwards nobody could tell whether the write took, or give the donor its own data back.</p>
      </Part>
      <Part title="What not to do">
        <Points>
          <li>Don’t send a copy as a second read. A file with the same digest, name and time is found, and proves nothing.</li>
          <li>Don’t set a read aside because it is in the way. Find out why it differs: <See topic="differ">when reads differ</See>.</li>
          <li>Don’t take equal for right: <See topic="limits">what equal reads don’t prove</See>.</li>
        </Points>
      </Part>
    </>
  );
}
