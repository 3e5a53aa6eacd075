import type { ComponentProps } from "react";
import { controlClass, Field, type FieldWords } from "./field";

/** One line of text. Spread react-hook-form's `register(...)` into it. Identifiers are `mono`. */
export function Input({ id, label, hint, error, wayOut, quiet, mono, className, ...rest }: FieldWords & Omit<ComponentProps<"input">, keyof FieldWords> & { mono?: boolean }) {
  return (
    <Field id={id} label={label} hint={hint} error={error} wayOut={wayOut} quiet={quiet} className={className}>
      {(control) => <input type="text" {...rest} {...control} className={controlClass(Boolean(error), mono, "min-h-control")} />}
    </Field>
  );
}
