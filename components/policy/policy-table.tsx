import { countOf } from "@/lib/core/quantity";
import type { Policy } from "@/lib/core/words";
import { NUMBER_RULES, type Rule, SECOND_FACTOR, TWO_PERSON } from "./rules";

/** The rules for everybody to read. */
export function PolicyTable({ policy }: { policy: Policy }) {
  const rows: { rule: Rule; value: string }[] = [
    ...NUMBER_RULES.map((rule) => ({ rule, value: countOf(policy[rule.key], rule.unit.replace(/s$/, "")) })),
    { rule: TWO_PERSON, value: policy.twoPersonRule ? "on" : "off" },
    { rule: SECOND_FACTOR, value: policy.secondFactor ? "on" : "off" },
  ];
  return (
    <table className="ruled lines">
      <caption className="sr-only">Rules of the workshop</caption>
      <thead><tr><th scope="col">Rule</th><th scope="col">Now</th><th scope="col">Why</th><th scope="col">Where it decides</th></tr></thead>
      <tbody>
        {rows.map(({ rule, value }) => (
          <tr key={rule.key}>
            <th scope="row">{rule.label}</th>
            <td className="l-top whitespace-nowrap !text-ink"><b>{value}</b></td>
            <td className="l-full max-w-[60ch]">{rule.why}</td>
            <td>{rule.decides}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
