import type { BoardView } from "@/lib/views";
import type { Spot } from "./board-place";

const PINS = 4;

/** Two rows of four pins above and below a chip. */
function pinPath({ x, y, width, height }: Spot): string {
  const [step, pin, tall] = [width / PINS, width > 50 ? 7 : 5, width > 50 ? 10 : 7];
  return Array.from({ length: PINS }, (_, i) => {
    const left = x + step * i + (step - pin) / 2;
    return `M${left} ${y - tall + 1}h${pin}v${tall}h-${pin}zM${left} ${y + height - 1}h${pin}v${tall}h-${pin}z`;
  }).join("");
}

/** A board as we draw it, not a photo: the chips on record carry their real designators and lead to their pages. */
export function BoardDrawing({ board, spots, still = false, moving }: {
  board: BoardView;
  spots: ReadonlyMap<string, Spot>;
  /** without ways to the chips' pages: while they are being placed */
  still?: boolean;
  /** the chip that is being placed */
  moving?: string;
}) {
  const name = [board.boardNumber, board.revision].filter(Boolean).join(" ").toUpperCase();
  return (
    <svg className={`pcb pcb-${board.role}`} viewBox="0 0 560 250" role="group" aria-label={`Drawing of the ${board.role} board with its chips`}>
      <path d="M6 6H400l20 20H554V232a12 12 0 0 1-12 12H352a62 62 0 0 0-124 0H18A12 12 0 0 1 6 232Z" fill="var(--f)" stroke="var(--e)" strokeWidth="2"/>
      <g fill="none" stroke="var(--t)" strokeWidth="2"><path d="M60 22v46l26 26v40M72 22v40l26 26M84 22v34l26 26h34M96 22v28l24 24h24M240 118h36l30-30h64M240 126h40l30-30h60M240 134h44l30-30h56M240 142h18l26 26h23M206 92V60l22-22h120M214 92V64l20-20h114M222 92V68l16-16h110M144 150h-30l-34 34M144 158h-26l-30 30M430 112h40l20-20M430 120h44l16-16M430 128h48l12-12M268 168v-14l-14-14h-14M340 186v10M110 176v34h44M118 176v26h36"/></g>
      <g fill="var(--p)"><path d="M44 8h8v14h-8zM56 8h8v14h-8zM68 8h8v14h-8zM80 8h8v14h-8zM92 8h8v14h-8zM104 8h8v14h-8zM116 8h8v14h-8zM140 8h8v14h-8zM152 8h8v14h-8zM164 8h8v14h-8zM176 8h8v14h-8zM188 8h8v14h-8zM200 8h8v14h-8z"/><circle cx="240" cy="186" r="5"/><circle cx="268" cy="172" r="5"/><circle cx="312" cy="172" r="5"/><circle cx="340" cy="186" r="5"/><path d="M496 72h40v6h-40zM496 84h40v6h-40zM496 96h40v6h-40zM496 108h40v6h-40zM496 120h40v6h-40zM496 132h40v6h-40zM496 144h40v6h-40zM496 156h40v6h-40z"/></g>
      <g fill="var(--b)" stroke="var(--s)" strokeWidth="1.4"><rect x="144" y="92" width="92" height="84"/><rect x="370" y="82" width="60" height="60"/><rect x="300" y="30" width="74" height="34"/><rect x="156" y="196" width="30" height="18"/><rect x="446" y="196" width="38" height="22"/><rect x="250" y="70" width="16" height="10"/><rect x="250" y="88" width="16" height="10"/><rect x="36" y="84" width="12" height="22"/><rect x="36" y="114" width="12" height="22"/><rect x="340" y="166" width="12" height="8"/><rect x="360" y="166" width="12" height="8"/><rect x="380" y="166" width="12" height="8"/><rect x="400" y="166" width="12" height="8"/></g>
      <g fill="var(--s)"><circle cx="151" cy="169" r="3"/><circle cx="376" cy="136" r="3"/><circle cx="306" cy="58" r="2.5"/></g>
      <g fill="var(--paper)" stroke="var(--p)" strokeWidth="5"><circle cx="24" cy="24" r="7.500"/><circle cx="534" cy="46" r="7.500"/><circle cx="26" cy="224" r="7.500"/><circle cx="532" cy="222" r="7.500"/></g>
      <text x="250" y="22" fontSize="11" fontWeight="500" fill="var(--s)" {...(name.length > 21 ? { textLength: 142, lengthAdjust: "spacingAndGlyphs" } : {})}>{name}</text>
      {board.chips.map((chip) => {
        const at = spots.get(chip.id);
        if (!at) return null;
        const drawn = <Drawn designator={chip.designator} at={at} moving={chip.id === moving} />;
        return still ? <g key={chip.id}>{drawn}</g> : <a key={chip.id} href={`/chips/${chip.id}`} aria-label={`${chip.designator}, ${board.role}`}>{drawn}</a>;
      })}
    </svg>
  );
}

function Drawn({ designator, at, moving }: { designator: string; at: Spot; moving: boolean }) {
  return (
    <>
      <path d={pinPath(at)} fill="var(--p)" />
      {moving ? <rect x={at.x - 6} y={at.y - 12} width={at.width + 12} height={at.height + 24} fill="none" stroke="var(--p)" strokeWidth="2" strokeDasharray="5 4" /> : null}
      <rect className="hot" x={at.x} y={at.y} width={at.width} height={at.height} />
      <circle cx={at.x + 6} cy={at.y + at.height - 6} r="2.5" fill="var(--s)" />
      <text x={at.x + at.width / 2 + 2} y={at.y + at.height / 2 + 5} textAnchor="middle" fontSize={at.width > 50 ? 16 : 13} fontWeight="700" fill="var(--s)"
        {...(designator.length > 4 ? { textLength: at.width - 14, lengthAdjust: "spacingAndGlyphs" } : {})}>{designator}</text>
    </>
  );
}
