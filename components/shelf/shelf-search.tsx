import Link from "next/link";
import { Button, ButtonLink } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { withCommas } from "@/lib/core/quantity";
import { SHELF_STATE_WORD, type ShelfList, type ShelfState, SHELF_STATES } from "@/lib/core/shelf";

interface Asked {
  q: string;
  sort: string;
  order: string;
  state: ShelfState | "";
}

/** A plain form and plain links, so that they work before any script: the address says what is shown. */
export function ShelfSearch({ q, sort, order, state, counts }: Asked & { counts: ShelfList["counts"] }) {
  const words = (shown: string) => new URLSearchParams({ ...(q ? { q } : {}), ...(sort ? { sort, order } : {}), ...(shown ? { state: shown } : {}) }).toString();
  const all = SHELF_STATES.reduce((sum, one) => sum + counts[one], 0);
  return (
    <>
      <form action="/shelf" role="search" className="no-print flex flex-wrap items-end gap-3 pb-4">
        <Input label="Search" name="q" defaultValue={q} autoComplete="off" maxLength={200} placeholder="Number, board number, marking, place" className="w-[320px] max-w-full" />
        {sort ? <><input type="hidden" name="sort" value={sort} /><input type="hidden" name="order" value={order} /></> : null}
        {state ? <input type="hidden" name="state" value={state} /> : null}
        <Button type="submit">Search</Button>
        {q ? <ButtonLink variant="text" href="/shelf">Show all</ButtonLink> : null}
        <span className="pb-2 text-t2 text-ink-2">A saved content is found by the first 8 digits of its SHA-256.</span>
      </form>
      <div className="no-print flex flex-wrap items-center justify-between gap-x-6 gap-y-2 pb-4">
        <nav aria-label="Which boards" className="flex flex-wrap gap-x-5 gap-y-1">
          {(["", ...SHELF_STATES] as const).map((value) => (
            <Link key={value} href={`/shelf?${words(value)}`} aria-current={value === state ? "true" : undefined} className={`py-1 ${value === state ? "font-strong !text-ink !no-underline" : ""}`}>
              {value === "" ? "All" : SHELF_STATE_WORD[value]} <span className="font-mono text-t2">{withCommas(value === "" ? all : counts[value])}</span>
            </Link>
          ))}
        </nav>
        <a href={`/api/shelf-boards?${new URLSearchParams({ ...(q ? { q } : {}), ...(state ? { state } : {}), format: "csv" }).toString()}`} download>Save as CSV</a>
      </div>
    </>
  );
}
