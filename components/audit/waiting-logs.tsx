import { AssessmentForm } from "@/components/custody/assessment-form";
import { problemWords } from "@/components/custody/log-words";
import { FindingLine } from "@/components/ui/finding-line";
import { exactText } from "@/components/ui/times";
import { withCommas } from "@/lib/core/quantity";
import type { WaitingLog } from "@/lib/core/audit-rows";
import { LogPlace } from "./log-place";

/** Logs that don't check out and that nobody has assessed since: what was found, and the form. */
export function WaitingLogs({ logs, timeZone, assesses }: { logs: readonly WaitingLog[]; timeZone: string; assesses: boolean }) {
  return (
    <ul className="grid gap-6">
      {logs.map((log) => (
        <li key={log.chainId} className="grid gap-2.5 border-t border-rule pt-4 first:border-0 first:pt-0">
          <h3 className="text-t4 font-bold"><LogPlace place={log} /></h3>
          <div>
            {log.findings.slice(0, 5).map((finding, i) => <FindingLine key={i} kind="block">{problemWords(finding)}</FindingLine>)}
            {log.count > 5 ? <p className="mt-1 text-ink-2">And {withCommas(log.count - 5)} more: see the log.</p> : null}
          </div>
          <p className="text-t2 text-ink-2">Found by the check of {exactText(log.checkedAt, timeZone)}. {log.driveId ? "Approvals, hand-outs and transfers of this drive wait." : "Work on the drives goes on."}</p>
          {assesses ? <AssessmentForm chainId={log.chainId} /> : <p className="text-ink-2">An auditor records the assessment.</p>}
        </li>
      ))}
    </ul>
  );
}
