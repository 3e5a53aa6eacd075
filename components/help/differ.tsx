import { LEAST_READS, LEAST_SEATINGS, MOST_DISPUTED } from "@/lib/core/composite-rules";
import { COMPOSITE_LIMIT } from "@/lib/core/composite";
import { causeAdvice, LOOKS_LIKE } from "@/lib/core/diagnose-sentences";
import type { FindingCode } from "@/lib/core/words";
import { CautionList } from "./caution-list";
import { HelpTable, Part, Points, See, Steps, WidePart } from "./prose";

/** What one sees in lanes and hex view before one knows its name. */
const PATTERNS: { code: FindingCode; seen: string }[] = [
  { code: "lost-contact", seen: "Whole stretches of FF or 00 in one read only" },
  { code: "random-flips", seen: "Single bits here and there, both ways" },
  { code: "one-way-flips", seen: "Single bits, nearly all from 1 to 0 or all from 0 to 1" },
  { code: "bit-slip", seen: "Equal up to a place, everything behind it different" },
  { code: "byte-slip", seen: "The same, and the bytes behind it are there, but one place off" },
  { code: "foreign-blocks", seen: "A few long blocks of other data" },
  { code: "address-line", seen: "One read holds a stretch twice, the other doesn’t" },
  { code: "buffer-edge", seen: "Differences that all begin at round addresses" },
  { code: "edge-bytes", seen: "Only the first or the last bytes" },
];

export function DifferHelp() {
  return (
    <>
      <CautionList of={["power", "original", "heat"]} />
      <Part title="What the page shows">
        <p>Under each two reads lies a lane: a plain line where they are equal, ticks where they differ. The matrix shows which reads are equal as a whole, and how many bytes differ otherwise. “Compare” shows the bytes of two or three reads side by side; N and P jump from one difference to the next, G goes to an address, “Find” looks for bytes or a text, and a stretch can be copied as hex.</p>
        <p>“Looks like” is a guess from the pattern. What decides is only whether reads are equal.</p>
      </Part>
      <Part title="What to do first">
        <Steps>
          <li>Don’t change everything at once. Clean the pins, seat the clip anew, and read again: that is a new seating.</li>
          <li>Look which read stands alone. If it is the only one of its seating, the seating is the likely cause.</li>
          <li>Follow the advice beside it, then take as many reads as are still asked for.</li>
          <li>When enough reads agree and you know why one doesn’t, set that one aside and write the reason.</li>
        </Steps>
      </Part>
      <WidePart title="By what you see" note="The names lead to more.">
        <HelpTable caption="Patterns of difference and their likely causes" head={["You see", "It looks like", "Do this"]} rows={PATTERNS.map(({ code, seen }) => ({ key: code, cells: [seen, <See key="to" topic="findings" at={code}>{LOOKS_LIKE[code]}</See>, causeAdvice(code)] }))} />
      </WidePart>
      <Part title="Setting aside" id="set-aside">
        <p>A read that is set aside counts for nothing any more, but it stays: its bytes, its findings and your reason are on the page, in the log and in the bundle. It can be counted again, with a reason too. A technician sets their own reads aside, a lead any; a read-back is a lead’s to set aside. Whoever took a read stays a taker of it for the two-person rule.</p>
        <p>“It was in the way” is no reason. “Clip slipped, pin 5 was bent” is one.</p>
      </Part>
      <Part title="When no two agree" id="composite">
        <p>A lead can have a composite made: for every bit the value that most reads hold. Its rules:</p>
        <Points>
          <li>At least {LEAST_READS} reads in at least {LEAST_SEATINGS} seatings, all of the chip’s own size.</li>
          <li>At most {MOST_DISPUTED * 100} % of the bytes may be disputed, and no bit may be tied.</li>
          <li>A read that is off as a whole (blank, shifted, of another chip) has no vote.</li>
          <li>Where three reads are equal there is no vote: equal reads are better than any vote.</li>
        </Points>
        <p>A composite is marked as such wherever it is shown, its unsure bytes are listed one by one, and it is never approved without a written reason. {COMPOSITE_LIMIT}</p>
      </Part>
    </>
  );
}
