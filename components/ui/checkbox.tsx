import { useId, type ComponentProps, type ReactNode } from "react";
import { Mark } from "./mark";

/** A tick (or a choice of one, with `type="radio"`) with its words at the right. */
export function Checkbox({ label, error, className = "", type = "checkbox", ...rest }: Omit<ComponentProps<"input">, "type"> & { label: ReactNode; error?: ReactNode; type?: "checkbox" | "radio" }) {
  const id = useId();
  return (
    <div className={className}>
      <label className="grid cursor-pointer grid-cols-[20px_minmax(0,1fr)] items-start gap-2.5 py-0.5">
        <input type={type} {...rest} className="tick-box" aria-describedby={error ? id : undefined} aria-invalid={error ? true : undefined} />
        <span>{label}</span>
      </label>
      {error ? <span id={id} role="alert" className="flex gap-[7px] pl-[30px] text-t2 font-medium text-block"><Mark kind="block" className="mt-px" /><span>{error}</span></span> : null}
    </div>
  );
}
