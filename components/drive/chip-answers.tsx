import type { UseFormRegisterReturn } from "react-hook-form";
import { Button } from "@/components/ui/button";
import { FindingLine } from "@/components/ui/finding-line";
import { Input } from "@/components/ui/input";
import { TextArea } from "@/components/ui/text-area";
import { sizeText } from "@/lib/core/quantity";
import { MAX_IMAGE_BYTES } from "@/lib/limits";
import type { ChipField } from "./chip-form";
import { type ChipSays, idSays, sfdpSays, type SizeProposal } from "./chip-says";
import { sizeFromText } from "./size-words";

/** What the chip answers of itself: optional, and a proposal for the size that only a hand takes over. */
export function ChipAnswers({ register, errors, typed, onTakeSize }: {
  register(name: ChipField): UseFormRegisterReturn;
  errors: Partial<Record<ChipField, { message?: string }>>;
  typed: { size: string; idBytes: string; sfdp: string };
  onTakeSize(proposal: SizeProposal): void;
}) {
  const size = sizeFromText(typed.size);
  return (
    <fieldset className="grid gap-3 border-t border-rule pt-3">
      <legend className="sr-only">What the chip answers of itself</legend>
      <div className="grid gap-1.5">
        <Input label="Id, if the chip gave one" mono autoComplete="off" spellCheck={false} placeholder="12 40 13" hint="The three bytes that a serial flash answers to command 9F." error={errors.idBytes?.message} {...register("idBytes")} />
        <Says says={idSays(typed.idBytes)} size={size} onTake={onTakeSize} />
      </div>
      <div className="grid gap-1.5">
        <TextArea label="SFDP table, if the chip gave one" rows={2} spellCheck={false} hint="The dump as hex digits, from address 0. It tells the size more surely than the id." error={errors.sfdp?.message} {...register("sfdp")} />
        <Says says={sfdpSays(typed.sfdp)} size={size} onTake={onTakeSize} />
      </div>
    </fieldset>
  );
}

function Says({ says, size, onTake }: { says: ChipSays | null; size: number | null; onTake(proposal: SizeProposal): void }) {
  if (!says) return null;
  const { kind, sentence, proposal } = says;
  const takable = proposal !== null && proposal.bytes <= MAX_IMAGE_BYTES && proposal.bytes !== size;
  return (
    <div role="status" className="grid justify-items-start gap-1.5 text-t2">
      <FindingLine kind={kind}>{sentence}{proposal && proposal.bytes === size ? " That is the size above." : ""}</FindingLine>
      {takable ? <Button size="small" onClick={() => onTake(proposal)}>Take {sizeText(proposal.bytes)} over as the size</Button> : null}
    </div>
  );
}
