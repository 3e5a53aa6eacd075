import type { BenchGroup } from "./bench-words";

function Stop({ group }: { group: BenchGroup }) {
  const inside = (
    <>
      <i className="hole" aria-hidden="true" />
      <b>{group.rows.length}</b>
      <span>{group.label}</span>
      {group.late > 0 ? <em>{group.late} late</em> : null}
    </>
  );
  return group.rows.length > 0 ? <a className="stop" href={`#${group.key}`}>{inside}</a> : <div className="stop">{inside}</div>;
}

/** The way of every chip in the shop, with how many stand where. */
export function BenchRoute({ groups }: { groups: readonly BenchGroup[] }) {
  return (
    <ol className="bus" aria-label="Chips on the bench, by what has to be done next">
      {groups.map((group) => <li key={group.key} className={`${group.detour ? "detour" : ""} ${group.rows.length === 0 ? "none" : ""}`}><Stop group={group} /></li>)}
    </ol>
  );
}
