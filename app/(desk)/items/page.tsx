import type { Metadata } from "next";
import Link from "next/link";
import { itemTitle, itemWhere } from "@/components/item/item-words";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Button, ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Input } from "@/components/ui/input";
import { PastTheEnd, Pages } from "@/components/ui/pages";
import { PageTitle } from "@/components/ui/section";
import { momentText } from "@/components/ui/times";
import { signedIn } from "@/lib/auth/page";
import { placedItems } from "@/lib/queries/items";
import { listInput } from "@/lib/schemas/case";

export const metadata: Metadata = { title: "Where things are" };

export default async function ItemsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const asked = listInput.safeParse(await searchParams);
  const input = asked.success ? asked.data : listInput.parse({});
  const list = await placedItems(actor, input);
  const pages = { total: list.total, page: list.page, pageSize: list.pageSize, href: (page: number) => `/items?${new URLSearchParams({ q: input.q, page: String(page) })}` };
  return (
    <DeskShell session={session} current="custody">
      <PageMain className="pb-8">
        <PageTitle note="The latest hand-over of every drive, board and lifted chip. A hand-over is recorded on the drive’s page.">Where things are</PageTitle>
        <form className="no-print flex max-w-[560px] items-end gap-3 pb-5" role="search" aria-label="Items">
          <Input key={input.q} className="flex-1" label="Person, place, seal or case number" name="q" defaultValue={input.q} maxLength={200} autoComplete="off" />
          <Button type="submit">Search</Button>
        </form>
        {list.items.length === 0 && list.total > 0 ? <PastTheEnd {...pages} /> : list.items.length === 0 ? <Empty title={input.q ? `Nothing matches “${input.q}”.` : "Nothing has changed hands yet."} action={input.q ? <ButtonLink href="/items">Show all</ButtonLink> : null}>An item is listed here from its first hand-over on.</Empty> : (
          <>
            <table className="ruled lines">
              <caption className="sr-only">Where each item is</caption>
              <thead><tr><th scope="col">Item</th><th scope="col">Where it is</th><th scope="col">Condition</th><th scope="col">Seal</th><th scope="col">Handed over</th></tr></thead>
              <tbody>
                {list.items.map(({ driveId, item, handOver }) => (
                  <tr key={handOver.id}>
                    <th scope="row" className="min-w-[44ch] !whitespace-normal [overflow-wrap:anywhere] phone:min-w-0 print:min-w-0"><Link href={`/drives/${driveId}#items`}>{itemTitle(item)}</Link></th>
                    <td className="l-full">{itemWhere(handOver)}</td>
                    <td data-l="Condition" className="[overflow-wrap:anywhere]">{handOver.condition}</td>
                    <td data-l="Seal" className="min-w-[10ch] font-mono">{handOver.sealNumber ?? <span className="font-face text-ink-3">none</span>}</td>
                    <td data-l="Handed over" className="whitespace-nowrap">{momentText(handOver.givenAt, session.timeZone)}</td>
                  </tr>
                ))}
              </tbody>
            </table>
            <Pages {...pages} />
          </>
        )}
      </PageMain>
    </DeskShell>
  );
}
