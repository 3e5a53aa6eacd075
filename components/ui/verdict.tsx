import type { ReactNode } from "react";
import { Mark, type MarkKind } from "./mark";

/** One sentence with the finding and the next step, one paragraph why, up to three buttons; the matrix at its right, or below where it would leave the sentence no room. */
export function Verdict({ mark, sentence, why, buttons, aside }: { mark: MarkKind; sentence: ReactNode; why?: ReactNode; buttons?: ReactNode; aside?: ReactNode }) {
  return (
    <div className="flex flex-wrap items-start gap-x-12 gap-y-5 mid:gap-x-7 print:gap-x-5">
      <div className="grid flex-[1_1_26rem] grid-cols-[28px_minmax(0,1fr)] gap-x-3.5 phone:basis-full phone:grid-cols-[24px_minmax(0,1fr)] phone:gap-x-2.5 print:basis-[22rem]">
        <Mark kind={mark} size={28} className="mt-0.5 [--hole:var(--paper)]" />
        <div>
          <p className="max-w-[38em] text-t6 font-strong tracking-[-0.008em] text-pretty phone:text-[1.25rem] phone:leading-7 print:text-[1.125rem] print:leading-6">{sentence}</p>
          {why ? <p className="mt-2 max-w-[62ch] text-t4 text-ink-2">{why}</p> : null}
          {buttons ? <div className="no-print mt-4 flex flex-wrap items-center gap-x-3 gap-y-2">{buttons}</div> : null}
        </div>
      </div>
      {aside ? <div className="max-w-full overflow-x-auto">{aside}</div> : null}
    </div>
  );
}
