"use client";

import { useRouter } from "next/navigation";
import { useRef, useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { FindingLine } from "@/components/ui/finding-line";
import { Note } from "@/components/ui/note";
import { Progress } from "@/components/ui/progress";
import { useChange } from "@/components/ui/use-change";
import type { ChainRow } from "@/lib/core/audit-rows";
import { withCommas } from "@/lib/core/quantity";
import { fetcher, send } from "@/lib/http/send";
import type { CustodyCheckView, ListView } from "@/lib/views";
import { placeText } from "./audit-words";
import { LogPlace } from "./log-place";

const A_PAGE = 50;

interface Run {
  done: number;
  total: number;
  faults: { row: ChainRow; count: number }[];
  ended: "running" | "done" | "stopped";
}

/** Checks every log, one after the other and page by page, and can be stopped: what is checked by then stays checked. */
export function CheckAll({ total }: { total: number }) {
  const router = useRouter();
  const stop = useRef(false);
  const [run, setRun] = useState<Run | null>(null);
  const { refusal, busy, attempt } = useChange();

  async function all() {
    stop.current = false;
    let now: Run = { done: 0, total, faults: [], ended: "running" };
    const put = (more: Partial<Run>) => setRun((now = { ...now, ...more }));
    put({});
    for (let page = 1; !stop.current; page += 1) {
      const list = await fetcher<ListView<ChainRow>>(`/api/audit/drives?sort=case&order=asc&page=${page}&pageSize=${A_PAGE}`);
      put({ total: list.total });
      for (const row of list.items) {
        if (stop.current) break;
        const { findings } = await send<CustodyCheckView>("POST", `/api/audit/checks/${row.chainId}`);
        put({ done: now.done + 1, faults: findings.length > 0 ? [...now.faults, { row, count: findings.length }] : now.faults });
      }
      if (list.items.length < A_PAGE) break;
    }
    put({ ended: stop.current ? "stopped" : "done" });
    router.refresh();
  }

  const said = run && (run.ended === "running" ? `Checking: ${withCommas(run.done)} of ${withCommas(run.total)}.` : run.ended === "stopped" ? `Stopped after ${withCommas(run.done)} of ${withCommas(run.total)}.` : `Checked all ${withCommas(run.done)}.`);
  return (
    <div className="grid max-w-[640px] gap-3">
      <Buttons>
        <Button variant="lead" disabled={busy} onClick={() => void attempt(all)}>Check all {withCommas(total)} now</Button>
        {busy ? <Button variant="stop" onClick={() => { stop.current = true; }}>Stop the checking</Button> : null}
      </Buttons>
      {run ? (
        <div className="grid gap-1.5">
          {busy ? <Progress share={run.total === 0 ? 1 : run.done / run.total} label="Logs checked" /> : null}
          <p role="status">{said} {run.faults.length === 0 ? (run.done > 0 ? "Nothing was found." : "") : `${run.faults.length === 1 ? "One log doesn't" : `${run.faults.length} logs don't`} check out:`}</p>
          {run.faults.map(({ row, count }) => <FindingLine key={row.chainId} kind="block"><LogPlace place={row} />: {count === 1 ? "one finding" : `${withCommas(count)} findings`}<span className="sr-only">, {placeText(row)}</span></FindingLine>)}
        </div>
      ) : null}
      {refusal ? <Note kind="caution" role="alert" title="The checking stopped here.">{refusal}</Note> : null}
    </div>
  );
}
