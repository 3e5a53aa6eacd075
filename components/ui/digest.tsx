import { groupsOf8 } from "@/lib/core/digest";
import { CopyButton } from "./copy-button";

/** First 8, ellipsis, last 8; the copy button always gives all 64. */
export function Digest({ sha256, copy = true }: { sha256: string; copy?: boolean }) {
  return (
    <span className="inline-flex items-center whitespace-nowrap">
      <code title={sha256}>{sha256.slice(0, 8)}<span className="text-ink-3">…</span>{sha256.slice(-8)}</code>
      {copy ? <CopyButton text={sha256} label="Copy all 64 digits of the SHA-256" done="Copied all 64 digits." /> : null}
    </span>
  );
}

/** All 64 digits in groups of 8, where a person must compare. */
export function DigestInFull({ sha256, copy = true, className = "" }: { sha256: string; copy?: boolean; className?: string }) {
  return (
    <code className={`inline-flex flex-wrap gap-x-[0.6em] font-medium ${className}`}>
      {groupsOf8(sha256).map((group, i) => <span key={i} className="whitespace-nowrap">{group}</span>)}
      {copy ? <CopyButton text={sha256} label="Copy all 64 digits of the SHA-256" done="Copied all 64 digits." /> : null}
    </code>
  );
}
