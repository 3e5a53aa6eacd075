import { dayText, momentText } from "@/components/ui/times";
import type { ShareView } from "@/lib/views";
import { WithdrawShare } from "./withdraw-share";

function stateOf(share: ShareView, timeZone: string, now: string): string {
  if (share.withdrawnAt) return `Withdrawn ${momentText(share.withdrawnAt, timeZone)}`;
  if (share.expiresAt <= now) return `Ended ${dayText(share.expiresAt, timeZone)}`;
  return share.openedAt ? `Opened ${momentText(share.openedAt, timeZone)}` : "Not opened yet";
}

/** Links to the summary that went out: to whom, opened or not, until when. */
export function ShareList({ shares, timeZone, withdraws, now }: { shares: readonly ShareView[]; timeZone: string; withdraws: boolean; now: string }) {
  return (
    <div className="overflow-x-auto phone:overflow-visible">
      <table className="ruled lines">
        <caption className="sr-only">Private links to the summary</caption>
        <thead><tr><th scope="col">Sent to</th><th scope="col">Sent</th><th scope="col">By</th><th scope="col">Until</th><th scope="col">State</th><th scope="col"><span className="sr-only">Withdraw</span></th></tr></thead>
        <tbody>
          {shares.map((share) => (
            <tr key={share.id} className={share.withdrawnAt || share.expiresAt <= now ? "is-aside" : ""}>
              <th scope="row" className="[overflow-wrap:anywhere]">{share.email}</th>
              <td data-l="Sent">{momentText(share.createdAt, timeZone)}</td>
              <td data-l="By">{share.createdBy.name}</td>
              <td data-l="Until">{dayText(share.expiresAt, timeZone)}</td>
              <td>{stateOf(share, timeZone, now)}</td>
              <td className="text-right">{withdraws && !share.withdrawnAt && share.expiresAt > now ? <WithdrawShare share={share} /> : null}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
