/** Status marks: shape first, then colour; a word always stands beside them or in `label`. */
export type MarkKind = "ok" | "done" | "block" | "caution" | "note" | "wait" | "run" | "aside";

const COLOUR: Record<MarkKind, string> = {
  ok: "text-green", done: "text-green", block: "text-block", caution: "text-caution", note: "text-note",
  wait: "text-ink-3", run: "text-copper", aside: "text-ink-3",
};

const RING = { cx: 8, cy: 8, fill: "none", stroke: "currentColor", strokeWidth: 1.8 };
const HOLE = { fill: "var(--hole)" };

function Shape({ kind }: { kind: MarkKind }) {
  switch (kind) {
    case "ok":
      return <><circle cx="8" cy="8" r="8" fill="currentColor" /><path d="M4 5.2h8v2H4zM4 8.8h8v2H4z" {...HOLE} /></>;
    case "done":
      return <><circle cx="8" cy="8" r="8" fill="currentColor" /><path d="M3.9 8.3l1.4-1.4 1.9 1.9 3.6-3.9 1.5 1.3-5 5.5z" {...HOLE} /></>;
    case "block":
      return <><path fill="currentColor" d="M0 0h16v16H0z" /><path d="M3.5 5h9v2h-9zM3.5 9h9v2h-9zM9.6 2.4l1.7.9-4.9 10.3-1.7-.9z" {...HOLE} /></>;
    case "caution":
      return <><path fill="currentColor" d="M8 .6l8 14.6H0z" /><path d="M7.1 5.6h1.8v4.6H7.1zM7.1 11.4h1.8v1.8H7.1z" {...HOLE} /></>;
    case "note":
      return <><circle {...RING} r="7.1" /><path d="M7.1 7h1.8v5H7.1zM7.1 4h1.8v1.8H7.1z" fill="currentColor" /></>;
    case "wait":
      return <circle {...RING} r="6.9" strokeDasharray="2.7 2.7" />;
    case "run":
      return <><circle {...RING} r="7" /><path d="M8 3.4a4.6 4.6 0 0 1 0 9.2z" fill="currentColor" /></>;
    case "aside":
      return <><circle {...RING} r="7" /><path d="M3 13L13 3" stroke="currentColor" strokeWidth="1.8" /></>;
  }
}

export function Mark({ kind, size = 16, label, className = "" }: { kind: MarkKind; size?: number; label?: string; className?: string }) {
  const name = label ? { role: "img", "aria-label": label } : { "aria-hidden": true as const };
  return (
    <svg className={`mark inline-block ${COLOUR[kind]} ${className}`} viewBox="0 0 16 16" width={size} height={size} {...name}>
      <Shape kind={kind} />
    </svg>
  );
}
