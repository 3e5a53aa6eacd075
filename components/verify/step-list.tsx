import { Mark, type MarkKind } from "@/components/ui/mark";
import type { Fault, Step, StepState } from "@/lib/core/verify/report";

const STATE: Record<StepState, { mark: MarkKind; word: string }> = {
  "in-order": { mark: "ok", word: "In order" },
  "not-in-order": { mark: "block", word: "Not in order" },
  "not-checked": { mark: "wait", word: "Not checked" },
};

function FaultLine({ place, sentence, expected, found }: Fault) {
  return (
    <li className="border-t border-rule py-2 first:border-t-0 first:pt-0 last:pb-0">
      <code className="block font-semibold [overflow-wrap:anywhere]">{place}</code>
      <span className="block">{sentence}</span>
      {expected === undefined && found === undefined ? null : (
        <dl className="mt-1 grid grid-cols-[auto_minmax(0,1fr)] gap-x-3 text-t2 text-ink-2">
          {expected === undefined ? null : <><dt>Expected</dt><dd className="font-mono [overflow-wrap:anywhere]">{expected}</dd></>}
          {found === undefined ? null : <><dt>Found</dt><dd className="font-mono [overflow-wrap:anywhere]">{found}</dd></>}
        </dl>
      )}
    </li>
  );
}

/** What was checked, in its order, each with what was found; every fault by its place. */
export function StepList({ steps }: { steps: Step[] }) {
  return (
    <ol className="border-b border-rule">
      {steps.map(({ key, title, state, sentence, faults }) => {
        const { mark, word } = STATE[state];
        return (
          <li key={key} data-step={key} data-state={state} className="grid grid-cols-[16px_minmax(0,1fr)] gap-x-3 border-t border-rule py-2.5 print:break-inside-avoid">
            <Mark kind={mark} className="mt-0.5 [--hole:var(--paper)]" />
            <div>
              <p className="flex flex-wrap items-baseline justify-between gap-x-4"><b>{title}</b><span className={`text-t2 ${state === "not-in-order" ? "font-strong text-block" : state === "in-order" ? "text-green" : "text-ink-2"}`}>{word}</span></p>
              <p className="max-w-[80ch] text-ink-2 [overflow-wrap:anywhere]">{sentence}</p>
              {faults.length > 0 ? <ul className="mt-2 bg-block-wash px-3 py-2.5 [--hole:var(--block-wash)] print:border">{faults.map((fault, i) => <FaultLine key={i} {...fault} />)}</ul> : null}
            </div>
          </li>
        );
      })}
    </ol>
  );
}
