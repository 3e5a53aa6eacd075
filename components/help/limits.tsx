import { Part, Points, See } from "./prose";

export function LimitsHelp() {
  return (
    <>
      <Part title="What equal reads do not prove" id="equal" first>
        <p>Two equal reads say: the chip gave the same bytes twice. They don’t say that these are the bytes it holds.</p>
        <Points>
          <li>A clip that sits wrong gives the same wrong image every time. So does a stuck line, a size set wrong, or another command set.</li>
          <li>Reads of one seating share whatever is wrong with it. That is why more than one seating is asked for.</li>
          <li>All FF three times in a row is three times no contact, as often as it is an empty chip.</li>
          <li>Equal reads of the wrong chip are equal, too. Compare the designator and the label.</li>
          <li>The data may have been spoiled before the drive came here. A chip that was hurt can be read well and hold nonsense.</li>
          <li>A very small chip can be read alike twice by luck even when single bits are unsure.</li>
        </Points>
        <p>What speaks for an image is that many different things agree: several seatings, a plausible id, content that looks like this kind of board’s, no finding, and a second person who looked.</p>
      </Part>
      <Part title="What a transfer is not" id="not-an-upgrade">
        <p>A transfer moves one board’s own data to another board, unchanged. It is <b>not a firmware upgrade</b>: an upgrade replaces a drive’s firmware by another version, made for many drives. A transfer keeps what only this one drive has; with another drive’s data, however new, the drive doesn’t start or is damaged.</p>
        <Points>
          <li>It is not a repair of the board. The donor brings the electronics.</li>
          <li>It is not data recovery. No file of the customer is read here; whether the drive’s data can be read afterwards is another question.</li>
          <li>Twinread is not a chip programmer. It talks to no chip; it takes in what your reader wrote.</li>
        </Points>
      </Part>
      <Part title="What “verified” does not say" id="verified">
        <Points>
          <li>It says that the donor’s chip held exactly the approved image when it was read back.</li>
          <li>It doesn’t say that the image was right; see above.</li>
          <li>It doesn’t say that the donor board is sound, that it fits in every other part, or that the drive will start.</li>
          <li>It doesn’t hold for ever: drives rewrite their chips when they run.</li>
        </Points>
      </Part>
      <Part title="What a composite does not say" id="composite">
        <p>A majority shows what repeats, not what is true. The odds that the page gives hold only if errors are independent, and errors at a bench seldom are. Three equal reads are better than any vote.</p>
      </Part>
      <Part title="What the log can’t show" id="log">
        <Points>
          <li>It shows what was written down, when and under whose name. It can’t see the bench: whether the clip sat on this chip is the word of whoever says so.</li>
          <li>Whoever holds the workshop’s keys and rules its database as well could write another history. Against that help the seals, bundles, mails and summaries that have left the house: keep them.</li>
          <li>The check page comes from the workshop’s own server. To trust nobody, run the bundle’s <code>check.sh</code> on a machine of your own. See <See topic="custody" at="bundle">the bundle</See>.</li>
          <li>Times are the server’s clock. A clock that was set wrong gives wrong times in the right order.</li>
        </Points>
      </Part>
    </>
  );
}
