import { useId, type ReactNode } from "react";
import { Mark } from "./mark";

export interface FieldWords {
  label: ReactNode;
  hint?: ReactNode;
  /** stands in place of the hint; says what to do */
  error?: ReactNode;
  /** a way out beside the error, such as a button that fills in a likely value */
  wayOut?: ReactNode;
  /** the label is for screen readers only */
  quiet?: boolean;
}

export interface ControlProps {
  id: string;
  "aria-describedby"?: string;
  "aria-invalid"?: true;
}

const CONTROL = "w-full rounded-none bg-sheet text-t3 text-ink disabled:border-dashed disabled:bg-transparent disabled:text-ink-3";

export function controlClass(wrong: boolean, mono = false, className = ""): string {
  const border = wrong ? "border-2 border-block px-[9px] py-1.5" : "border border-rule-2 px-2.5 py-[7px] hover:border-ink-2";
  return `${CONTROL} ${border} ${mono ? "font-mono" : "font-face"} ${className}`;
}

export function Field({ id, label, hint, error, wayOut, quiet, className = "", children }: FieldWords & { id?: string; className?: string; children: (control: ControlProps) => ReactNode }) {
  const made = useId();
  const name = id ?? made;
  const below = error || hint ? `${name}-below` : undefined;
  return (
    <div className={`grid content-start gap-1 ${className}`}>
      <label htmlFor={name} className={quiet ? "sr-only" : "min-h-5 text-t2 leading-5 font-semibold"}>{label}</label>
      {children({ id: name, "aria-describedby": below, "aria-invalid": error ? true : undefined })}
      {error ? (
        <span id={below} role="alert" className="flex gap-[7px] text-t2 font-medium text-block">
          <Mark kind="block" className="mt-px" /><span>{error}{wayOut ? <> {wayOut}</> : null}</span>
        </span>
      ) : hint ? <span id={below} className="text-t2 text-ink-2">{hint}</span> : null}
    </div>
  );
}
