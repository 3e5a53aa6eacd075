import type { CSSProperties } from "react";
import { fitText, type LabelSize } from "@/lib/core/paper";
import type { LabelView } from "@/lib/views";
import { LabelPlate, PinOne } from "./label-plate";
import { Qr } from "./qr";
import { insideOf, Sheet } from "./sheet";

/** Millimetres: side of the square code, and what stands beside the lines of a chip's card. */
const CODE: Record<LabelSize, number> = { "62x29": 21, "70x37": 27 };
const DRAWING = 12;
const [PLATE, GAP, NAME] = [8, 0.8, 9];

const volts = (millivolts: number | null) => (millivolts === null ? "supply ?" : `${millivolts / 1000} V`);

function Lines({ label, size }: { label: LabelView; size: LabelSize }) {
  const { width, height } = insideOf(size);
  const box = {
    width: width - CODE[size] - 1.4 - NAME - (label.chip ? DRAWING + 1 : 0),
    height: (height - PLATE - GAP - 0.8) / Math.max(2, label.lines.length), largest: 10, smallest: 4,
  };
  return (
    <dl className="label-lines">
      {label.lines.map(({ name, value }) => {
        const fitted = fitText(value, box);
        return <div key={name}><dt>{name}</dt><dd style={{ fontSize: `${fitted.points}pt` }} title={value}>{fitted.text}</dd></div>;
      })}
    </dl>
  );
}

/** One label on its own page. The square code holds the case number with its check character and nothing else. */
export function LabelSheet({ label, size }: { label: LabelView; size: LabelSize }) {
  const { height } = insideOf(size);
  return (
    <Sheet paper={size} label={`Label: ${label.title}`}>
      <div className="sticker" style={{ "--code": `${CODE[size]}mm` } as CSSProperties}>
        <div className="code">
          <Qr text={label.refChecked} size={`${CODE[size]}mm`} />
          <b>{label.refChecked}</b>
        </div>
        <div className="body">
          <LabelPlate kind={label.kind} title={label.title} />
          <div className="label-rows">
            <Lines label={label} size={size} />
            {label.chip ? (
              <div className="grid content-between justify-items-center" style={{ width: `${DRAWING}mm` }}>
                <PinOne pins={Math.min(label.chip.pins, 16)} board={label.chip.board} width={`${DRAWING}mm`} height={`${height - PLATE - GAP - 4}mm`} />
                <span className="label-supply">{volts(label.chip.supplyMillivolts)}</span>
              </div>
            ) : null}
          </div>
        </div>
      </div>
    </Sheet>
  );
}
