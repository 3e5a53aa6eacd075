import { STATE_LABEL } from "@/lib/core/chip-state";
import { CHIP_STATES, type ChipStateCode, readName, type Stage, STAGES } from "@/lib/core/words";
import { GLOSSARY } from "./glossary";
import { HelpTable, WidePart } from "./prose";

const STATE: Record<ChipStateCode, string> = {
  verified: "The latest transfer was read back often enough, and every read-back equals the approved image. Fit, test and return.",
  failed: "A read-back differs, or the donor holds an image that is no longer cleared. Write again, then read back.",
  written: "A transfer is recorded, read-backs are missing.",
  approved: "An approval stands. Write the image or move the chip.",
  unread: "No read of the original counts yet.",
  "reads-disagree": "Two counted reads of the original differ. Find out why, read again, set aside what is off.",
  held: "The reads agree, but a finding blocks or needs a reason.",
  "needs-reads": "The reads agree so far; more of them, or more seatings, are asked for.",
  ready: "Enough reads agree and nothing stands against it. A lead decides.",
};
const STAGE: Record<Stage, { what: string; decides: string }> = {
  before: { what: "A read of the original’s chip.", decides: "Decides the approval." },
  donor: { what: "What the donor’s chip held before anything was written to it.", decides: "Saves it: two equal reads." },
  after: { what: "What the donor’s chip, or the moved chip, holds after the transfer.", decides: "Decides whether the transfer is verified." },
};

export function WordsHelp() {
  return (
    <>
      <WidePart title="Words">
        <HelpTable caption="Words of the screens" head={["Word", "Means"]} rows={[...GLOSSARY].sort((a, b) => a.word.localeCompare(b.word, "en")).map(({ word, means }) => ({ key: word, cells: [word, means] }))} />
      </WidePart>
      <WidePart title="States of a chip" id="states" note="The first that applies is the state. Nobody types it in.">
        <HelpTable caption="States of a chip" head={["On screen", "When"]} rows={CHIP_STATES.map((code) => ({ key: code, cells: [code === "needs-reads" ? `${STATE_LABEL[code]}, some taken` : STATE_LABEL[code], STATE[code]] }))} />
      </WidePart>
      <WidePart title="Kinds of read" id="stages">
        <HelpTable caption="Kinds of read" head={["On screen", "What it is", "What for"]} rows={STAGES.map((code) => ({ key: code, cells: [`${readName(code, 1)}, ${readName(code, 2)} …`, STAGE[code].what, STAGE[code].decides] }))} />
      </WidePart>
    </>
  );
}
