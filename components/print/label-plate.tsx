import type { LabelView } from "@/lib/views";

type Kind = LabelView["kind"];

/** What the label sticks to, told by shape: a disc for a drive, filled for the customer's board, outlined for the donor, notched with pins for a chip. */
function Shape({ kind }: { kind: Kind }) {
  switch (kind) {
    case "drive":
      return <><rect x="1" y="1" width="368" height="78" rx="39" fill="none" stroke="var(--ink)" strokeWidth="3" vectorEffect="non-scaling-stroke" /><circle cx="42" cy="40" r="25" fill="none" stroke="var(--ink)" strokeWidth="8" /><circle cx="42" cy="40" r="7" fill="var(--ink)" /></>;
    case "original":
      return <rect width="370" height="80" fill="var(--mask)" />;
    case "donor":
      return <><rect x="2" y="2" width="366" height="76" fill="none" stroke="var(--green)" strokeWidth="4" /><rect x="10" y="10" width="350" height="60" fill="none" stroke="var(--green)" strokeWidth="2" /></>;
    case "chip":
      return (
        <>
          <path d="M20 0h22v12H20zM80 0h22v12H80zM140 0h22v12h-22zM200 0h22v12h-22zM260 0h22v12h-22zM320 0h22v12h-22zM20 68h22v12H20zM80 68h22v12H80zM140 68h22v12h-22zM200 68h22v12h-22zM260 68h22v12h-22zM320 68h22v12h-22z" fill="var(--copper-2)" />
          <path d="M2 12h366v56H2V54a14 14 0 0 0 0-28z" fill="var(--sheet)" stroke="var(--ink)" strokeWidth="3.5" />
          <circle cx="36" cy="56" r="5" fill="var(--ink)" />
        </>
      );
  }
}

export function LabelPlate({ kind, title }: { kind: Kind; title: string }) {
  return (
    <span className={`label-plate label-${kind}`} data-kind={kind}>
      <svg viewBox="0 0 370 80" preserveAspectRatio="none" aria-hidden="true"><Shape kind={kind} /></svg>
      <span>{title}</span>
    </span>
  );
}

/** The chip seen from above: notch at the top, pin 1 at the upper left with its dot; filled for the customer's, outlined for the donor's. */
export function PinOne({ pins, board, width, height }: { pins: number; board: "original" | "donor"; width: string; height: string }) {
  const side = pins / 2;
  const [step, top] = [14, 12];
  const body = side * step + 8;
  const filled = board === "original";
  return (
    <svg viewBox={`0 0 84 ${body + 24}`} style={{ width, height }} className="block" role="img" aria-label={`The chip seen from above, ${pins} pins, pin 1 at the upper left`}>
      {Array.from({ length: side }, (_, i) => top + 8 + i * step).map((y, i) => (
        <g key={y}>
          <rect x="14" y={y - 3.5} width="12" height="7" fill={i === 0 ? "var(--ink)" : "none"} stroke="var(--ink)" strokeWidth="1.6" />
          <rect x="58" y={y - 3.5} width="12" height="7" fill="none" stroke="var(--ink)" strokeWidth="1.6" />
        </g>
      ))}
      <path d={`M26 ${top}h10a6 6 0 0 0 12 0h10v${body - 4}H26z`} fill={filled ? "var(--mask)" : "var(--sheet)"} stroke={filled ? "var(--mask)" : "var(--ink)"} strokeWidth="2" />
      <circle cx="33" cy={top + 10} r="3.4" fill={filled ? "var(--silk)" : "var(--ink)"} />
      <text x="5" y={top + 13} fontSize="15" fontWeight="700" fill="var(--ink)" fontFamily="var(--mono)" textAnchor="middle">1</text>
      <text x="77" y={top + 13} fontSize="9" fill="var(--ink)" fontFamily="var(--mono)" textAnchor="middle">{pins}</text>
    </svg>
  );
}
