import type { ComponentProps } from "react";
import { controlClass, Field, type FieldWords } from "./field";

export function TextArea({ id, label, hint, error, wayOut, quiet, className, ...rest }: FieldWords & Omit<ComponentProps<"textarea">, keyof FieldWords>) {
  return (
    <Field id={id} label={label} hint={hint} error={error} wayOut={wayOut} quiet={quiet} className={className}>
      {(control) => <textarea {...rest} {...control} className={controlClass(Boolean(error), false, "block min-h-[68px] resize-y")} />}
    </Field>
  );
}
