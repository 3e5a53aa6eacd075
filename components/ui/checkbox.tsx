import { useId, type ComponentProps, type ReactNode } from "react";

/** A tick (or a choice of one, with `type="radio"`) with its words at the right. */
export function Checkbox({ label, error, className = "", type = "checkbox", ...rest }: Omit<ComponentProps<"input">, "type"> & { label: ReactNode; error?: ReactNode; type?: "checkbox" | "radio" }) {
  const id = useId();
  return (
    <div className={className}>
      <label className="grid cursor-pointer grid-cols-[20px_minmax(0,1fr)] items-start gap-2.5 py-0.5">
        <input type={type} {...rest} className="tick-box" aria-describedby={error ? id : undefined} aria-invalid={error ? true : undefined} />
        <span>{label}</span>
      </label>
      {error ? <span id={id} role="alert" className="text-t2 font-medium text-block">{error}</span> : null}
    </div>
  );
}
