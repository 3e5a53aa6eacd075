import { useId } from "react";
import type { UseFormRegisterReturn } from "react-hook-form";
import { Checkbox } from "@/components/ui/checkbox";
import { Mark } from "@/components/ui/mark";
import { AS_SENT, type AsSent } from "@/lib/core/words";

/** One question with three answers, none of them chosen before somebody has looked. */
export function Choice({ legend, words, register, error, quiet }: { legend: string; words: Record<AsSent, string>; register: UseFormRegisterReturn; error?: string; quiet?: boolean }) {
  const id = useId();
  return (
    <fieldset aria-describedby={error ? id : undefined} className="min-w-0">
      <legend className={quiet ? "sr-only" : "min-h-5 text-t2 leading-5 font-semibold"}>{legend}</legend>
      <div className="flex flex-wrap gap-x-5 gap-y-1 py-1">{AS_SENT.map((value) => <Checkbox key={value} type="radio" value={value} label={words[value]} {...register} />)}</div>
      {error ? <span id={id} role="alert" className="flex gap-[7px] text-t2 font-medium text-block"><Mark kind="block" className="mt-px" /><span>{error}</span></span> : null}
    </fieldset>
  );
}
