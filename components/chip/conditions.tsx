import { Mark, type MarkKind } from "@/components/ui/mark";
import type { ConditionView } from "@/lib/views";

const MARK: Record<ConditionView["state"], { kind: MarkKind; label: string }> = {
  met: { kind: "ok", label: "met" }, open: { kind: "wait", label: "open" }, against: { kind: "block", label: "against it" },
};

/** Mark, rule, value. The approval opens when all are met. */
export function Conditions({ conditions }: { conditions: readonly ConditionView[] }) {
  return (
    <ul>
      {conditions.map((condition) => (
        <li key={condition.key} className="grid grid-cols-[16px_minmax(0,1fr)_auto] gap-2.5 border-b border-rule py-[7px]">
          <Mark {...MARK[condition.state]} className="mt-0.5 [--hole:var(--paper)]" />
          <span>{condition.rule}</span>
          <span className="max-w-[24ch] text-right text-ink-2">{condition.value}</span>
        </li>
      ))}
    </ul>
  );
}
