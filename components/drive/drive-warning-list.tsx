"use client";

import { useEffect, useState } from "react";
import useSWR from "swr";
import { Note } from "@/components/ui/note";
import type { DriveWarning } from "@/lib/core/drive-warnings";
import { backgroundFetcher } from "@/lib/http/send";

const PAUSE_MS = 250;

/** What speaks against the label data typed so far, asked of the server after a pause in typing. */
export function useDriveWarnings(caseId: string, { serial, partNumber }: { serial: string; partNumber: string }, except?: string): DriveWarning[] {
  const [asked, setAsked] = useState<string | null>(null);
  useEffect(() => {
    const query = new URLSearchParams({ serial: serial.trim(), partNumber: partNumber.trim(), ...(except ? { except } : {}) });
    const timer = setTimeout(() => setAsked(serial.trim() ? `/api/cases/${caseId}/drive-warnings?${query.toString()}` : null), PAUSE_MS);
    return () => clearTimeout(timer);
  }, [caseId, serial, partNumber, except]);
  const { data } = useSWR<{ warnings: DriveWarning[] }, Error>(asked, backgroundFetcher, { keepPreviousData: true });
  return asked ? data?.warnings ?? [] : [];
}

export function DriveWarningList({ warnings, live = false }: { warnings: readonly DriveWarning[]; live?: boolean }) {
  return (
    <div role={live ? "status" : undefined} className="grid gap-2">
      {warnings.map((one) => (
        <Note key={one.code} kind={one.kind} title={one.title}>
          {one.text}
          {one.cases.map((found) => <span key={found.id}> <a href={`/cases/${found.id}`} {...(live ? { target: "_blank" } : {})}>Open case {found.ref}</a></span>)}
        </Note>
      ))}
    </div>
  );
}
