import { Button } from "@/components/ui/button";
import { Input } from "@/components/ui/input";

/** A plain form: the search stands in the page's address. On a phone this is the only search field. */
export function FindForm({ q }: { q: string }) {
  return (
    <form action="/find" className="no-print flex max-w-[720px] flex-wrap items-start gap-3" role="search" aria-label="Find">
      <Input key={q} className="min-w-[240px] flex-1 phone:basis-full" label="Case number, serial, part or board number, customer, CRC-32 or SHA-256" name="q" defaultValue={q} maxLength={200} autoComplete="off" spellCheck={false} hint="A digest may be cut short: 8 digits are enough." />
      <Button type="submit" variant="lead" className="mt-6 phone:mt-0">Find</Button>
    </form>
  );
}
