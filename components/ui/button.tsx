import Link from "next/link";
import { useId, type ComponentProps, type MouseEvent, type ReactNode } from "react";

export type ButtonVariant = "lead" | "plain" | "stop" | "text";
export type ButtonSize = "normal" | "small";

interface Look {
  /** one `lead` to a screen region */
  variant?: ButtonVariant;
  size?: ButtonSize;
  className?: string;
  children: ReactNode;
}

const BASE = "btn inline-flex items-center justify-center gap-2 border text-center font-semibold no-underline";
const SIZE: Record<ButtonSize, string> = {
  normal: "min-h-control px-3.5 py-[5px] text-t3",
  small: "min-h-7 px-2.5 py-0.5 text-t2",
};
const VARIANT: Record<ButtonVariant, string> = {
  lead: "btn-lead border-act-bg bg-act-bg px-[18px] text-act-ink hover:border-act-hover hover:bg-act-hover",
  plain: "border-rule-2 bg-sheet text-ink hover:border-ink hover:bg-paper",
  stop: "border-block bg-sheet text-block hover:bg-block-wash",
  text: "border-transparent bg-transparent !px-0 text-green underline decoration-1 underline-offset-3 hover:decoration-2",
};
const WAITING = "border border-dashed border-rule-2 bg-transparent text-ink-3 cursor-not-allowed";

export function buttonClass({ variant = "plain", size = "normal", className = "" }: Omit<Look, "children">): string {
  return `${BASE} ${SIZE[size]} ${VARIANT[variant]} ${className}`;
}

/** Keeps the press, also by Enter in a field, from doing anything. */
const stop = (event: MouseEvent) => event.preventDefault();

/**
 * A button that cannot be used yet stays in place, dashed, with its `reason` beside it; it can be reached by Tab all the
 * same, and the one just pressed keeps the focus while its work goes on. A name that ends in "…" asks something first.
 */
export function Button({ variant, size = "normal", className, reason, disabled, type = "button", children, ...rest }: Look & Omit<ComponentProps<"button">, keyof Look> & { reason?: string | null }) {
  const id = useId();
  const waits = Boolean(reason || disabled);
  const button = (
    <button type={type} {...rest} {...(waits ? { "aria-disabled": true } : {})} {...(reason ? { "aria-describedby": id } : {})} {...(waits && (rest.onClick || type === "submit") ? { onClick: stop } : {})}
      className={waits ? `${BASE} ${SIZE[size]} ${WAITING} ${className ?? ""}` : buttonClass({ variant, size, className })}>
      {children}
    </button>
  );
  if (reason === undefined) return button;
  // around it also while there is none, so that a reason that comes or goes leaves the button and its focus where they are
  return <span className={reason ? "inline-flex flex-wrap items-center gap-x-3 gap-y-1" : "contents"}>{button}{reason ? <span id={id} className="no-print text-ink-2">{reason}</span> : null}</span>;
}

export function ButtonLink({ variant, size, className, children, ...rest }: Look & Omit<ComponentProps<typeof Link>, keyof Look>) {
  return <Link className={buttonClass({ variant, size, className })} {...rest}>{children}</Link>;
}

export function Buttons({ children, className = "" }: { children: ReactNode; className?: string }) {
  return <div className={`no-print flex flex-wrap items-center gap-x-3 gap-y-2 ${className}`}>{children}</div>;
}
