"use client";

import Link from "next/link";
import type { FieldErrors, UseFormRegister } from "react-hook-form";
import { Checkbox } from "@/components/ui/checkbox";
import { Mark } from "@/components/ui/mark";
import { TextArea } from "@/components/ui/text-area";
import { countOf } from "@/lib/core/quantity";
import type { ConditionView } from "@/lib/views";
import type { AgainstItem } from "./against";
import type { DecisionForm } from "./decision-rules";

const HEAD = "border-b border-rule-2 pb-[5px] text-t4 font-bold";
const COUNT = "ml-1.5 text-t3 font-normal text-ink-2";

/** Two columns with a rule between: what stands for it, and what stands against it with its ticks and reasons. */
export function Ledger({ stands, against, looked, onLook, signs, register, errors }: {
  stands: readonly ConditionView[];
  against: readonly AgainstItem[];
  looked: ReadonlySet<string>;
  onLook(key: string, seen: boolean): void;
  /** false for who may only read the sheet */
  signs: boolean;
  register: UseFormRegister<DecisionForm>;
  errors: FieldErrors<DecisionForm>;
}) {
  const blocking = against.filter((i) => i.blocks).length;
  return (
    <div className="grid grid-cols-[minmax(0,5fr)_minmax(0,7fr)] narrow:grid-cols-[minmax(0,1fr)] narrow:gap-y-[22px]">
      <div className="pr-8 narrow:pr-0">
        <h3 className={HEAD}>Stands for it <span className={COUNT}>{stands.length}</span></h3>
        <ul>
          {stands.map((c) => (
            <li key={c.key} className="grid grid-cols-[16px_minmax(0,1fr)_auto] gap-2.5 border-b border-rule py-[7px]">
              <Mark kind="ok" label="met" className="mt-0.5 [--hole:var(--paper)]" />
              <span>{c.rule}</span>
              <span className="max-w-[18ch] text-right text-ink-2">{c.value}</span>
            </li>
          ))}
        </ul>
      </div>
      <div className="border-l border-rule-2 pl-8 narrow:border-l-0 narrow:pl-0">
        <h3 className={HEAD}>Stands against it <span className={COUNT}>{against.length === 0 ? "nothing" : `${against.length}, ${blocking === 0 ? "none blocking" : countOf(blocking, "line") + " blocking"}`}</span></h3>
        <ul>
          {against.map((item) => (
            <li key={item.key} className="grid grid-cols-[16px_minmax(0,1fr)_auto] items-start gap-x-3 gap-y-2 border-b border-rule py-[7px] phone:grid-cols-[16px_minmax(0,1fr)]">
              <Mark kind={item.mark} label={item.blocks ? "stands in the way" : "to be looked at"} className="mt-0.5 [--hole:var(--paper)]" />
              <span>
                <b className="block">{item.title}</b>
                {item.text} {item.link ? <Link href={item.link.href}>{item.link.label}</Link> : null}
              </span>
              {signs && !item.blocks ? (
                <Checkbox className="whitespace-nowrap phone:col-start-2" checked={looked.has(item.key)} onChange={(event) => onLook(item.key, event.target.checked)} label={<>Looked at<span className="sr-only">: {item.title}</span></>} />
              ) : null}
              {signs && item.reasonFor ? (
                <TextArea className="col-start-2 col-end-4 phone:col-end-3" label="Why may it be approved all the same?" hint="At least 10 characters. Goes into the custody log as you type it."
                  error={errors.reasons?.[item.reasonFor]?.message} {...register(`reasons.${item.reasonFor}`)} />
              ) : null}
            </li>
          ))}
        </ul>
      </div>
    </div>
  );
}
