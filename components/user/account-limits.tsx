"use client";

import type { ComponentProps } from "react";
import { Checkbox } from "@/components/ui/checkbox";
import { Input } from "@/components/ui/input";
import { type CaseChoice, CasePicker } from "./case-picker";

/** What an auditor's account may carry: the only cases it sees, and its last day. */
export function AccountLimits({ cases, onCases, onOpen, endsOn, errors }: {
  cases: CaseChoice[] | null;
  onCases(next: CaseChoice[] | null): void;
  onOpen(open: boolean): void;
  /** what the form's own field registers */
  endsOn: ComponentProps<"input">;
  errors: { cases?: string; endsOn?: string };
}) {
  return (
    <fieldset className="grid gap-3 border-l-4 border-rule pl-4">
      <legend className="sr-only">What this auditor sees, and until when</legend>
      <Checkbox label={<><b className="font-semibold">Only these cases</b><span className="block text-t2 text-ink-2">Every other case, and what belongs to the workshop as a whole, is then as if it weren’t there.</span></>}
        checked={cases !== null} onChange={(event) => onCases(event.target.checked ? [] : null)} />
      {cases ? <CasePicker chosen={cases} onChange={onCases} onOpen={onOpen} error={errors.cases} /> : null}
      <Input type="date" label="Last day" hint={cases ? "The account ends with this day. With a case list it needs one." : "The account ends with this day. Empty: it goes on."} error={errors.endsOn} className="max-w-56 phone:max-w-none" {...endsOn} />
    </fieldset>
  );
}
