import type { UseFormRegisterReturn } from "react-hook-form";
import { Button } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Select } from "@/components/ui/select";
import { sizeText } from "@/lib/core/quantity";
import type { Format } from "@/lib/core/words";
import { FORMAT_OPTIONS, textAddress } from "./file-look";
import { numberTyped } from "./upload-form";

type Name = "format" | "base" | "size" | "fill";

/** The format of the files, and for a text what the text itself doesn't say: where the image begins, how long it is, what fills its gaps. */
export function FormatFields({ format, register, errors, typed, addresses, onBase }: {
  format: Format;
  register(name: Name): UseFormRegisterReturn;
  errors: Partial<Record<Name, { message?: string }>>;
  typed: { base: string; size: string };
  /** what the waiting files give, all together */
  addresses: { first: number; last: number } | null;
  onBase(base: number): void;
}) {
  const choice = <Select label="Format of the files" options={FORMAT_OPTIONS} hint={format === "raw" ? "The file is the image, byte for byte." : "The text is kept as it came; the image is made from it."} error={errors.format?.message} {...register("format")} />;
  if (format === "raw") return choice;
  const size = numberTyped(typed.size);
  const base = numberTyped(typed.base);
  return (
    <>
      {choice}
      <fieldset className="grid content-start gap-3.5 border-l-2 border-rule-2 pl-3.5 narrow:col-span-full narrow:grid-cols-3 narrow:gap-x-5 phone:grid-cols-1">
        <legend className="sr-only">What the text doesn’t say</legend>
        {addresses ? (
          <p className="text-t2 text-ink-2 narrow:col-span-full" role="status">
            The waiting text gives addresses <code className="text-ink">{textAddress(addresses.first)}</code> to <code className="text-ink">{textAddress(addresses.last)}</code>.{" "}
            {base === addresses.first ? null : <Button variant="text" size="small" onClick={() => onBase(addresses.first)}>Use {textAddress(addresses.first)} as the base</Button>}
          </p>
        ) : null}
        <Input label="Base" mono placeholder="0x0000" autoComplete="off" hint="The address in the text at which the image’s first byte stands." error={errors.base?.message} {...register("base")} />
        <Input label="Size of the image, bytes" mono autoComplete="off" hint={`How many bytes the image has${size && size > 0 ? `: ${sizeText(size)}` : ""}. As the chip, unless only a part was read.`} error={errors.size?.message} {...register("size")} />
        <Input label="Fill" mono autoComplete="off" hint="The value of every byte that the text leaves out; an erased chip gives 0xFF." error={errors.fill?.message} {...register("fill")} />
      </fieldset>
    </>
  );
}
