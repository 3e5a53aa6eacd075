import type { Metadata } from "next";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Buttons } from "@/components/ui/button";
import { PageTitle } from "@/components/ui/section";
import { AddUser } from "@/components/user/add-user";
import { UserTable } from "@/components/user/user-table";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { userList } from "@/lib/queries/users";

export const metadata: Metadata = { title: "Users" };

export default async function UsersPage() {
  const { actor, session } = await signedIn();
  const users = await orNotFound(() => userList(actor));
  return (
    <DeskShell session={session} current="users">
      <PageMain className="pb-8">
        <div className="flex flex-wrap items-end justify-between gap-x-6">
          <PageTitle note="Each change is an entry of the workshop’s custody log. Accounts are switched off, never deleted.">Users</PageTitle>
          <Buttons className="pb-5"><AddUser /></Buttons>
        </div>
        <UserTable users={users} ownId={actor.id} timeZone={session.timeZone} />
      </PageMain>
    </DeskShell>
  );
}
