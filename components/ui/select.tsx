import type { ComponentProps } from "react";
import { controlClass, Field, type FieldWords } from "./field";

export interface Option {
  value: string;
  label: string;
}

export function Select({ id, label, hint, error, wayOut, quiet, options, className, ...rest }: FieldWords & Omit<ComponentProps<"select">, keyof FieldWords | "children"> & { options: readonly Option[] }) {
  return (
    <Field id={id} label={label} hint={hint} error={error} wayOut={wayOut} quiet={quiet} className={className}>
      {(control) => (
        <select {...rest} {...control} className={controlClass(Boolean(error), false, "min-h-control")}>
          {options.map((option) => <option key={option.value} value={option.value}>{option.label}</option>)}
        </select>
      )}
    </Field>
  );
}
