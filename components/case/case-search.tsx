import Link from "next/link";
import { Button, ButtonLink } from "@/components/ui/button";
import { Input } from "@/components/ui/input";

const STATES = [["", "All"], ["requested", "Parcel not here yet"], ["open", "Open"], ["closed", "Closed"], ["erasure-due", "Due for erasure"]] as const;
export type ShownState = (typeof STATES)[number][0];

/** The list by itself, or only one kind of its cases; what was searched stays. */
function StateFilter({ q, sort, order, state }: { q: string; sort: string; order: string; state: ShownState }) {
  const address = (shown: string) => `/cases?${new URLSearchParams({ ...(q ? { q } : {}), ...(sort ? { sort, order } : {}), ...(shown ? { state: shown } : {}) }).toString()}`;
  return (
    <nav aria-label="Which cases" className="no-print flex flex-wrap gap-x-5 gap-y-1 pb-4">
      {STATES.map(([value, words]) => <Link key={value} href={address(value)} aria-current={value === state ? "true" : undefined} className={`py-1 ${value === state ? "font-strong !text-ink !no-underline" : ""}`}>{words}</Link>)}
    </nav>
  );
}

/** A plain form, so that it works before any script: the address says what is searched. */
export function CaseSearch({ q, sort, order, state }: { q: string; sort: string; order: string; state: ShownState }) {
  return (
    <>
      <form action="/cases" role="search" className="no-print flex flex-wrap items-end gap-3 pb-4">
        <Input label="Search" name="q" defaultValue={q} autoComplete="off" placeholder="Case number, customer, serial" className="w-[320px] max-w-full" />
        {sort ? <><input type="hidden" name="sort" value={sort} /><input type="hidden" name="order" value={order} /></> : null}
        {state ? <input type="hidden" name="state" value={state} /> : null}
        <Button type="submit">Search</Button>
        {q ? <ButtonLink variant="text" href="/cases">Show all</ButtonLink> : null}
      </form>
      <StateFilter q={q} sort={sort} order={order} state={state} />
    </>
  );
}
