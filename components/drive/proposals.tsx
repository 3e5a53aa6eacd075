import type { LastUsed, Proposed } from "./last-used";

/** The list that a field proposes; nothing where there is nothing to propose. */
export function listOf(used: LastUsed, id: string, name: Proposed): string | undefined {
  return used[name]?.length ? `${id}-${name}` : undefined;
}

/** What was used last, offered by the browser while a field is typed. */
export function Proposals({ used, id, names }: { used: LastUsed; id: string; names: readonly Proposed[] }) {
  return names.map((name) => (used[name]?.length ? <datalist key={name} id={`${id}-${name}`}>{used[name].map((value) => <option key={value} value={value} />)}</datalist> : null));
}
