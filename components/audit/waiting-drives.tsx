import { AssessmentForm } from "@/components/custody/assessment-form";
import { problemWords } from "@/components/custody/log-words";
import { FindingLine } from "@/components/ui/finding-line";
import { exactText } from "@/components/ui/times";
import { withCommas } from "@/lib/core/quantity";
import type { WaitingDrive } from "@/lib/core/audit-rows";
import { LogPlace } from "./log-place";

/** Drives whose log doesn't check out and that nobody has assessed since: what was found, and the form. */
export function WaitingDrives({ drives, timeZone, assesses }: { drives: readonly WaitingDrive[]; timeZone: string; assesses: boolean }) {
  return (
    <ul className="grid gap-6">
      {drives.map((drive) => (
        <li key={drive.chainId} className="grid gap-2.5 border-t border-rule pt-4 first:border-0 first:pt-0">
          <h3 className="text-t4 font-bold"><LogPlace place={drive} /></h3>
          <div>
            {drive.findings.slice(0, 5).map((finding, i) => <FindingLine key={i} kind="block">{problemWords(finding)}</FindingLine>)}
            {drive.count > 5 ? <p className="mt-1 text-ink-2">And {withCommas(drive.count - 5)} more: see the log.</p> : null}
          </div>
          <p className="text-t2 text-ink-2">Found by the check of {exactText(drive.checkedAt, timeZone)}. Approvals, hand-outs and transfers of this drive wait.</p>
          {assesses && drive.driveId ? <AssessmentForm driveId={drive.driveId} /> : <p className="text-ink-2">An auditor records the assessment.</p>}
        </li>
      ))}
    </ul>
  );
}
