import { Mark } from "@/components/ui/mark";
import { Note } from "@/components/ui/note";
import { Section } from "@/components/ui/section";
import { momentText } from "@/components/ui/times";
import { OTHER_SERIAL_TEXT, OTHER_SERIAL_TITLE, startUpWords } from "@/lib/core/start-up";
import type { DriveStartUps } from "@/lib/views";
import { RecordStartUp } from "./record-start-up";
import { serialText, startUpMark } from "./start-up-words";

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** What the drive did on its donor board, newest first; another drive's serial stands on top of all. */
export function StartUpSection({ startUps, acts, timeZone }: { startUps: DriveStartUps; acts: boolean; timeZone: string }) {
  const { tests, refusal, label, closed, driveId } = startUps;
  const reason = closed ? "The case is closed. A lead reopens it first." : refusal;
  return (
    <Section id="start-up" title="Start-up test" note="The drive with its donor board, powered for the first time and after.">
      <div className="grid gap-4">
        {tests[0]?.serialMatches === false ? <Note kind="block" title={OTHER_SERIAL_TITLE}>{OTHER_SERIAL_TEXT} It reports <span className="font-mono">{tests[0].reportedSerial}</span>, its label says <span className="font-mono">{label}</span>.</Note> : null}
        {tests.length > 0 ? (
          <table className="ruled lines">
            <caption className="sr-only">Start-up tests</caption>
            <thead><tr><th scope="col">What it did</th><th scope="col">Serial reported</th><th scope="col">Note</th><th scope="col">By</th><th scope="col">When</th></tr></thead>
            <tbody>
              {tests.map((test) => (
                <tr key={test.id}>
                  <th scope="row" className="font-normal !whitespace-normal phone:!flex-[0_0_100%]"><span className="flex items-start gap-2"><Mark kind={startUpMark(test)} className="mt-0.5 shrink-0" />{capital(startUpWords(test))}</span></th>
                  <td data-l="Serial reported" className="[overflow-wrap:anywhere]">{test.reportedSerial ? <span className="font-mono">{test.reportedSerial}</span> : null}<span className="block text-t2 text-ink-2">{serialText(test)}</span></td>
                  <td data-l="Note" className="[overflow-wrap:anywhere] whitespace-pre-line">{test.note ?? <span className="text-ink-3">none</span>}</td>
                  <td data-l="By">{test.by.name}</td>
                  <td data-l="When" className="whitespace-nowrap">{momentText(test.at, timeZone)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        ) : <p className="text-ink-2">{refusal && !closed ? `Not tested yet. ${refusal}` : "Not tested yet."}</p>}
        {acts && !reason ? <div className="no-print"><RecordStartUp driveId={driveId} label={label} reason={null} lead={tests.length === 0} /></div> : null}
        {acts && reason && (tests.length > 0 || closed) ? <p className="text-ink-2">{reason}</p> : null}
      </div>
    </Section>
  );
}
