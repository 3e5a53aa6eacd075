import type { SizeSource } from "@/lib/core/words";
import { SIZE_SOURCES } from "@/lib/core/words";
import { NO_CHIP_TEXT } from "@/lib/core/no-chip";
import { CautionList } from "./caution-list";
import { HelpTable, Part, Points, See, Unsourced, WidePart } from "./prose";

const SOURCE: Record<SizeSource, { word: string; text: string }> = {
  marking: { word: "Marking", text: "Printed on the chip and looked up in its data sheet. Read it under a lens; one letter makes another chip." },
  id: { word: "Id", text: "The three bytes that a serial flash chip answers. They name a size by common practice only: confirm it by the marking." },
  sfdp: { word: "Its own table", text: "The parameter table that many serial flash chips carry (SFDP, JESD216). Surer than the id." },
  typed: { word: "Typed", text: "Nobody has said where it comes from. Findings about the size will say so." },
};

export function IdentifyHelp() {
  return (
    <>
      <CautionList of={["voltage", "static", "smallBoard"]} />
      <Part title="The drive">
        <p>Write down what stands on the label: part number, model and serial; one of the three is enough. An external drive often shows only the part number on its enclosure. What was measured or guessed doesn’t belong in these fields.</p>
        <p>The page warns when the same serial stands in another case, or when characters that look alike may have been mixed up. A warning refuses nothing: look at the label once more.</p>
        <p>Say whether the data is encrypted, and when in doubt say “suspected”. Then every page and ticket reminds whoever works on the drive to keep the enclosure’s small board with it.</p>
      </Part>
      <Part title="The original board">
        <p>The board number is printed or etched on the board, with a revision behind it. The markings of the main controller and the motor driver help to find a donor. Take a photo of both sides first; the chips are then placed on it.</p>
        <p>On some boards the unique data lies inside the main controller. Tick that when it is so. {NO_CHIP_TEXT[0]}</p>
      </Part>
      <Part title="The donor board">
        <Points>
          <li>Equal board number: it fits.</li>
          <li>Equal board number, but another revision, controller or motor driver: a caution. It may work, or may not; the differences are listed.</li>
          <li>Another board number: a lead has to write why it is taken all the same.</li>
        </Points>
        <p>The page Shelf says which boards in stock fit this drive. A board taken from the shelf belongs to the drive from then on.</p>
      </Part>
      <Part title="The chips" id="chips">
        <p>Boards carry one memory chip or two, most often with 8 legs<Unsourced />. For each: its designator as printed beside it (<code>U12</code>), the bus, the size, the supply, the package, and what it holds if you know. Both chips of a two-chip board belong to the transfer; read them one after the other and mind the designator.</p>
        <p>Each original chip is paired with the donor’s chip that is to take its content, of equal size. A new pair takes an approval back.</p>
        <p>The size may be any whole number of bytes up to 64 MiB. Most sizes are a power of two; another one is noted.</p>
      </Part>
      <WidePart title="Where the size comes from" id="size">
        <HelpTable caption="Where a chip’s size comes from" head={["Source", "What it is worth"]} rows={SIZE_SOURCES.map((key) => ({ key, cells: [SOURCE[key].word, SOURCE[key].text] }))} />
      </WidePart>
      <Part title="Corrections">
        <p>Whatever was typed can be corrected with a reason. What stood there before, what stands there now, who changed it and why stay in the log. Findings are worked out again, and an approval falls when the chip’s size or pair changes. Next: <See topic="reads">taking good reads</See>.</p>
      </Part>
    </>
  );
}
