import type { BenchGroup } from "./bench-words";

type Stopped = Pick<BenchGroup, "key" | "label" | "late"> & { rows: readonly unknown[] };

function Stop({ group }: { group: Stopped }) {
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

/** The way of every chip in the shop, with how many stand where; before it the parcels that are still to come. */
export function BenchRoute({ groups, toReceive }: { groups: readonly BenchGroup[]; toReceive: readonly unknown[] }) {
  return (
    <ol className="bus" aria-label="Parcels and chips, by what has to be done next">
      <li className={toReceive.length === 0 ? "none" : ""}><Stop group={{ key: "to-receive", label: "To receive", late: 0, rows: toReceive }} /></li>
      {groups.map((group) => <li key={group.key} className={`${group.detour ? "detour" : ""} ${group.rows.length === 0 ? "none" : ""}`}><Stop group={group} /></li>)}
    </ol>
  );
}
