import { Note } from "@/components/ui/note";

/** The top of a drive with its label: A is the part number, B the serial number. */
function LabelFigure() {
  return (
    <svg className="block h-auto w-full" viewBox="0 0 372 300" role="img" aria-label="Top of a drive with its label: A is the part number, B the serial number">
      <rect x="6" y="6" width="220" height="288" rx="10" fill="var(--sheet)" stroke="var(--ink-2)" strokeWidth="2" />
      <g fill="none" stroke="var(--ink-3)" strokeWidth="1.5">
        <circle cx="22" cy="22" r="6" /><circle cx="210" cy="22" r="6" /><circle cx="22" cy="278" r="6" /><circle cx="210" cy="278" r="6" />
        <path d="M19 22h6M207 22h6M19 278h6M207 278h6" /><circle cx="116" cy="86" r="54" stroke="var(--rule-2)" /><circle cx="116" cy="86" r="14" stroke="var(--rule-2)" />
      </g>
      <rect x="28" y="152" width="176" height="108" fill="var(--paper)" stroke="var(--ink-2)" strokeWidth="1.5" />
      <g fontFamily="var(--mono)" fontSize="12" fontWeight="600" fill="var(--ink)"><text x="38" y="180">PN 4471-0093-B</text><text x="38" y="204">SN 9KQ3-70B8-D2</text></g>
      <g fontFamily="var(--mono)" fontSize="10.5" fill="var(--ink-2)"><text x="38" y="228">2 TB  5 V 0.6 A</text><text x="38" y="246">MADE 04/2019</text></g>
      <g fill="none" stroke="var(--copper-2)" strokeWidth="2"><path d="M148 176h96l26-26h14" /><path d="M156 200h128" /></g>
      <g fill="var(--copper)"><circle cx="296" cy="150" r="12" /><circle cx="296" cy="200" r="12" /></g>
      <g fontFamily="var(--mono)" fontSize="13" fontWeight="700" fill="var(--paper)" textAnchor="middle"><text x="296" y="154.5">A</text><text x="296" y="204.5">B</text></g>
      <g fontFamily="var(--face)" fontSize="13" fill="var(--ink-2)"><text x="314" y="146">part</text><text x="314" y="161">number</text><text x="314" y="204">serial</text></g>
    </svg>
  );
}

const CONNECTOR = "M44 8h8v14h-8zM56 8h8v14h-8zM68 8h8v14h-8zM80 8h8v14h-8zM92 8h8v14h-8zM104 8h8v14h-8zM116 8h8v14h-8zM140 8h8v14h-8zM152 8h8v14h-8zM164 8h8v14h-8zM176 8h8v14h-8zM188 8h8v14h-8zM200 8h8v14h-8z";
const PADS = "M496 72h40v6h-40zM496 84h40v6h-40zM496 96h40v6h-40zM496 108h40v6h-40zM496 120h40v6h-40zM496 132h40v6h-40zM496 144h40v6h-40zM496 156h40v6h-40z";
const TRACES = "M60 22v46l26 26v40M72 22v40l26 26M84 22v34l26 26h34M96 22v28l24 24h24M240 118h36l30-30h64M240 126h40l30-30h60M206 92V60l22-22h72M214 92V64l20-20h66M144 150h-30l-34 34M430 112h40l20-20M430 128h48l12-12M268 168v-14l-14-14h-14M340 186v10";

/** The board of a drive: C is the board number, printed on it. */
function BoardFigure() {
  return (
    <svg className="pcb pcb-original" viewBox="-2 0 600 252" role="img" aria-label="Board side of the drive: C is the board number, printed on the board">
      <path d="M6 6H400l20 20H554V232a12 12 0 0 1-12 12H352a62 62 0 0 0-124 0H18A12 12 0 0 1 6 232Z" fill="var(--f)" stroke="var(--e)" strokeWidth="2" />
      <path d={TRACES} fill="none" stroke="var(--t)" strokeWidth="2" />
      <path d={CONNECTOR + PADS} fill="var(--p)" />
      <g fill="var(--b)" stroke="var(--s)" strokeWidth="1.4"><rect x="144" y="92" width="92" height="84" /><rect x="370" y="82" width="60" height="60" /><rect x="300" y="30" width="74" height="34" /><rect x="156" y="196" width="30" height="18" /><rect x="446" y="196" width="38" height="22" /><rect x="36" y="84" width="12" height="22" /><rect x="36" y="114" width="12" height="22" /></g>
      <g fill="var(--paper)" stroke="var(--p)" strokeWidth="5"><circle cx="24" cy="24" r="7.5" /><circle cx="534" cy="46" r="7.5" /><circle cx="26" cy="224" r="7.5" /><circle cx="532" cy="222" r="7.5" /></g>
      <g fill="var(--s)" fontSize="11" fontWeight="500"><text x="174" y="138">U1</text><text x="391" y="116">U2</text><text x="328" y="51">U5</text></g>
      <text x="250" y="23" fontSize="13" fontWeight="600" fill="var(--s)">BX 40-3179 REV C</text>
      <path d="M392 18h70l22 22h38" fill="none" stroke="var(--pad)" strokeWidth="3" />
      <circle cx="540" cy="40" r="19" fill="var(--copper)" /><text x="540" y="47" textAnchor="middle" fontSize="20" fontWeight="700" fill="var(--paper)">C</text>
    </svg>
  );
}

/** Drawings that show where the numbers stand, beside the form and above it on a phone. */
export function WhereToFind() {
  return (
    <aside className="rq-side" aria-labelledby="rq-where">
      <h2 id="rq-where">Where to find it</h2>
      <figure><LabelFigure /><figcaption>The drive from above. Every maker’s label looks different; the letters PN and SN or P/N and S/N are nearly always there. An external drive shows its part number on the enclosure.</figcaption></figure>
      <figure className="!mt-[18px]"><BoardFigure /><figcaption>The board, on the underside. Leave it on the drive if you can’t see the number.</figcaption></figure>
      <Note kind="caution" title="Please don’t power it again." className="mt-[18px]">Each try can spoil the chips further.</Note>
    </aside>
  );
}
