import { Button, ButtonLink } from "@/components/ui/button";
import { Input } from "@/components/ui/input";

/** A plain form, so that it works before any script: the address says what is searched. */
export function CaseSearch({ q, sort, order }: { q: string; sort: string; order: string }) {
  return (
    <form action="/cases" role="search" className="no-print flex flex-wrap items-end gap-3 pb-4">
      <Input label="Search" name="q" defaultValue={q} autoComplete="off" placeholder="Case number, customer, serial" className="w-[320px] max-w-full" />
      {sort ? <><input type="hidden" name="sort" value={sort} /><input type="hidden" name="order" value={order} /></> : null}
      <Button type="submit">Search</Button>
      {q ? <ButtonLink variant="text" href="/cases">Show all</ButtonLink> : null}
    </form>
  );
}
