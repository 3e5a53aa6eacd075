import type { CSSProperties } from "react";

/** A plain bar of 64 cells in one colour; nothing moves but the bar's end. */
export function Progress({ share, label }: { share: number; label: string }) {
  const percent = Math.max(0, Math.min(100, Math.floor(share * 64) / 64 * 100));
  return <span className="cells" style={{ "--p": `${percent}%` } as CSSProperties} role="progressbar" aria-valuemin={0} aria-valuemax={100} aria-valuenow={Math.round(share * 100)} aria-label={label} />;
}
