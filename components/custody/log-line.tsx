import { CopyButton } from "@/components/ui/copy-button";
import { DigestInFull } from "@/components/ui/digest";
import { exactText } from "@/components/ui/times";
import type { CustodyEntryView } from "@/lib/views";
import { prevOf } from "./log-words";

function shortHash(hash: string | null): string {
  if (hash === null) return "unreadable";
  return /^0{64}$/.test(hash) ? "0000…0000" : hash.slice(0, 8);
}

/** One entry in a line; opens to its body, hash, signature and key. */
export function LogLine({ entry, timeZone, trace, against, open, onToggle, full }: {
  entry: CustodyEntryView;
  timeZone: string;
  trace: string;
  /** the check found something at this entry */
  against: boolean;
  open: boolean;
  onToggle?(): void;
  /** with the hash of the one before */
  full: boolean;
}) {
  const id = `entry-${entry.seq}`;
  return (
    <>
      <tr id={id} className={against ? "is-odd" : ""}>
        <td className={`via via-${against ? "differs" : entry.kind} ${trace}`}><i aria-hidden="true" /><span className="sr-only">{entry.kind === "differs" ? "something differed" : entry.kind === "signed" ? "signed or verified" : entry.kind === "set-aside" ? "set aside" : "entry"}</span></td>
        <td>{entry.seq}</td>
        <td className="whitespace-nowrap">{entry.at ? exactText(entry.at, timeZone) : "unknown time"}</td>
        <td className="who">{entry.actor.name}{entry.actor.role === "system" ? null : <span className="text-ink-3">, {entry.actor.role}</span>}</td>
        <td className="what [overflow-wrap:anywhere]">
          {entry.kind === "signed" ? <b>{entry.sentence}</b> : entry.sentence}
          {onToggle ? <button type="button" className="no-print ml-2 min-h-6 text-t2 text-green underline underline-offset-3" aria-expanded={open} aria-controls={`${id}-body`} onClick={onToggle}>{open ? "Close" : "Open"}<span className="sr-only"> entry {entry.seq}</span></button> : null}
        </td>
        <td className="whitespace-nowrap">{entry.where}</td>
        {full ? <td><code className="text-ink-3" title={prevOf(entry) ?? undefined}>{shortHash(prevOf(entry))}</code></td> : null}
        <td><code title={entry.hash}>{shortHash(entry.hash)}</code></td>
      </tr>
      {open ? (
        <tr id={`${id}-body`} className="log-open">
          <td className="via via-body"><span className="sr-only">Body of entry {entry.seq}</span></td>
          <td colSpan={full ? 7 : 6}>
            <dl className="grid gap-3 border border-rule bg-sheet px-4 py-3">
              <div>
                <dt className="text-t1 text-ink-2">Body, byte for byte as it was hashed and signed <CopyButton text={entry.body} label={`Copy the body of entry ${entry.seq}`} done="Copied the body." /></dt>
                <dd className="log-body">{entry.body}</dd>
              </div>
              <div><dt className="text-t1 text-ink-2">Hash: SHA-256 of the body</dt><dd><DigestInFull sha256={entry.hash} /></dd></div>
              <div>
                <dt className="text-t1 text-ink-2">Signature, Ed25519, base64 <CopyButton text={entry.signature} label={`Copy the signature of entry ${entry.seq}`} done="Copied the signature." /></dt>
                <dd className="log-body">{entry.signature}</dd>
              </div>
              <div><dt className="text-t1 text-ink-2">Id of the key that signed it</dt><dd><DigestInFull sha256={entry.keyId} /></dd></div>
            </dl>
          </td>
        </tr>
      ) : null}
    </>
  );
}
