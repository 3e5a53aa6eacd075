import type { Metadata } from "next";
import { AddShelfBoard } from "@/components/shelf/add-shelf-board";
import { ShelfTable } from "@/components/shelf/shelf-list";
import { ShelfSearch } from "@/components/shelf/shelf-search";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { ButtonLink, Buttons } from "@/components/ui/button";
import { PageTitle } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { shelfList } from "@/lib/queries/shelf";
import { shelfListInput } from "@/lib/schemas/shelf";

export const metadata: Metadata = { title: "Donor shelf" };

export default async function ShelfPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  // an address that makes no sense shows the shelf from its beginning
  const parsed = shelfListInput.safeParse({ sort: "number", order: "desc", ...(await searchParams) });
  const { q, sort, order, state, ...page } = parsed.success ? parsed.data : shelfListInput.parse({ sort: "number", order: "desc" });
  const list = await orNotFound(() => shelfList(actor, { q, sort, order, state, ...page }));
  const changes = may(actor, "shelf.change");
  return (
    <DeskShell session={session} current="shelf">
      <PageMain className="pb-8">
        <div className="flex flex-wrap items-end justify-between gap-x-4">
          <PageTitle note="Donor boards in stock, and what became of those that were taken. A drive’s page offers the boards that fit it.">Donor shelf</PageTitle>
          {changes ? <Buttons className="pb-5"><AddShelfBoard /><ButtonLink href="/shelf/import">Import a list</ButtonLink></Buttons> : null}
        </div>
        <ShelfSearch q={q} sort={sort} order={order} state={state} counts={list.counts} />
        <ShelfTable list={list} sort={sort} order={order} q={q} state={state} timeZone={session.timeZone} changes={changes} />
      </PageMain>
    </DeskShell>
  );
}
