import { DigestInFull } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { exactText } from "@/components/ui/times";
import type { KeyRow } from "@/lib/views";
import { ChangeKey } from "./change-key";

const PURPOSE = { seal: "Signs the seals", log: "Signs the entries of the logs" } as const;

/** The keys with their fingerprints in full, for comparing with a mail: those in use first. */
export function KeyList({ keys, timeZone, changes, history }: { keys: readonly KeyRow[]; timeZone: string; changes: boolean; history: boolean }) {
  const current = keys.filter((key) => key.current).sort((a, b) => b.purpose.localeCompare(a.purpose));
  const former = keys.filter((key) => !key.current);
  return (
    <>
      <dl className="grid gap-5">
        {current.map((key) => (
          <div key={key.keyId} className="grid gap-1">
            <dt className="font-semibold">{PURPOSE[key.purpose]}</dt>
            <dd><DigestInFull sha256={key.keyId} className="text-t4" /></dd>
            <dd className="flex flex-wrap items-center gap-x-4 gap-y-1.5 text-t2 text-ink-2">
              <span>In use since {exactText(key.since, timeZone)}{history && key.reason ? `: ${key.reason}` : ""}</span>
              {changes ? <ChangeKey purpose={key.purpose} /> : null}
            </dd>
          </div>
        ))}
      </dl>
      {history && former.length > 0 ? (
        <div className="mt-5 overflow-x-auto phone:overflow-visible">
          <table className="ruled lines">
            <caption className="pb-1 text-left text-t2 text-ink-2">Keys used before: what they signed still counts.</caption>
            <thead><tr><th scope="col">Fingerprint</th><th scope="col">Signed</th><th scope="col">Introduced</th><th scope="col">By</th><th scope="col">Reason</th></tr></thead>
            <tbody>
              {former.map((key) => (
                <tr key={key.keyId}>
                  <th scope="row"><DigestInFull sha256={key.keyId} /></th>
                  <td>{key.purpose === "seal" ? "seals" : "entries"}</td>
                  <td className="whitespace-nowrap">{exactText(key.since, timeZone)}</td>
                  <td>{key.introducedBy.name}</td>
                  <td className="l-row [overflow-wrap:anywhere]">{key.reason ?? "the first key"}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      ) : null}
      {current.length === 0 ? <FindingLine kind="block">The log introduces no key that counts: nothing that is signed can be checked.</FindingLine> : null}
    </>
  );
}
