import type { ReactNode } from "react";
import { compositeBehind } from "@/components/composite/composite-words";
import { DigestInFull } from "@/components/ui/digest";
import { boardName } from "@/lib/core/board-name";
import { Empty } from "@/components/ui/empty";
import { countOf, sizeText } from "@/lib/core/quantity";
import type { DecisionView } from "@/lib/views";

function Fact({ term, children, mono, className = "" }: { term: string; children: ReactNode; mono?: boolean; className?: string }) {
  return (
    <div className={`min-w-0 ${className}`}>
      <dt className="text-t1 text-ink-2">{term}</dt>
      <dd className={`font-medium ${mono ? "font-mono" : ""}`}>{children}</dd>
    </div>
  );
}

/** The image in full: this is what the approver's eye compares. */
export function ImageFacts({ view: { chip, image } }: { view: DecisionView }) {
  if (!image) return <Empty title={`Nothing of ${chip.designator} is read yet.`}>{chip.state.sentence}</Empty>;
  const whole = image.sizeBytes === chip.sizeBytes ? ", the whole chip" : `, the chip holds ${sizeText(chip.sizeBytes)}`;
  const composite = compositeBehind(chip.reads, image.sha256);
  return (
    <dl className={`grid ${composite ? "grid-cols-[repeat(5,auto)]" : "grid-cols-[repeat(4,auto)]"} justify-start gap-x-14 gap-y-2.5 narrow:grid-cols-[repeat(2,auto)] phone:gap-x-6`}>
      <Fact term="SHA-256" className="narrow:col-span-full">
        <DigestInFull sha256={image.sha256} className="max-w-[25em] !text-[1.125rem] leading-[1.625rem] !font-semibold phone:max-w-none phone:!text-t4" />
      </Fact>
      <Fact term="CRC-32" mono>{image.crc32.toUpperCase()}</Fact>
      <Fact term="Size">{sizeText(image.sizeBytes)}{whole}</Fact>
      {composite?.derived ? <Fact term="Made by">majority of {countOf(composite.derived.voters.length, "read")}, no read itself</Fact> : null}
      <Fact term="From" mono>{boardName(chip.board)}</Fact>
    </dl>
  );
}
