"use client";

import { useRouter } from "next/navigation";
import { Fragment, useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Mark } from "@/components/ui/mark";
import { momentText } from "@/components/ui/times";
import { useSay } from "@/components/ui/toast";
import { dayInWords } from "@/lib/core/account-end";
import { send } from "@/lib/http/send";
import type { UserView } from "@/lib/views";
import { ChangeUser } from "./change-user";
import { ConfirmChange } from "./confirm-change";
import { OneTimePassword } from "./one-time-password";
import { namedCases } from "./role-words";

type Ask = { user: UserView; what: "change" | "password" | "switch" };

export function UserTable({ users, ownId, timeZone }: { users: readonly UserView[]; ownId: string; timeZone: string }) {
  const router = useRouter();
  const say = useSay();
  const [asked, setAsked] = useState<Ask | null>(null);
  const [shown, setShown] = useState<{ email: string; password: string } | null>(null);
  const close = () => setAsked(null);

  async function change(user: UserView, body: object) {
    const answer = await send<{ password?: string }>("PATCH", `/api/users/${user.id}`, body);
    close();
    router.refresh();
    if (answer.password) setShown({ email: user.email, password: answer.password });
    else say({ text: user.disabled ? `${user.name} can sign in again.` : `${user.name} can no longer sign in.` });
  }

  return (
    <>
      <table className="ruled lines users">
        <caption className="sr-only">Users</caption>
        <thead><tr><th scope="col">Name</th><th scope="col">E-mail address</th><th scope="col">Role</th><th scope="col">State</th><th scope="col">Last seen</th><th scope="col"><span className="sr-only">Change</span></th></tr></thead>
        <tbody>
          {users.map((user) => (
            <tr key={user.id} className={user.disabled || user.ended ? "is-aside" : ""}>
              <th scope="row">{user.name}{user.id === ownId ? <span className="font-normal text-ink-2"> (you)</span> : null}</th>
              <td className="[overflow-wrap:anywhere]">{user.email}</td>
              <td><RoleCell user={user} /></td>
              <td><State user={user} /></td>
              <td data-l="Last seen">{user.lastSeenAt ? momentText(user.lastSeenAt, timeZone) : "never"}</td>
              <td className="l-row">
                <Buttons className="justify-end phone:justify-start">
                  <Button size="small" onClick={() => setAsked({ user, what: "change" })}>Change…<span className="sr-only"> {user.name}</span></Button>
                  <Button size="small" onClick={() => setAsked({ user, what: "password" })}>New one-time password…<span className="sr-only"> for {user.name}</span></Button>
                  {user.id === ownId ? null : <Button size="small" variant={user.disabled ? "plain" : "stop"} onClick={() => setAsked({ user, what: "switch" })}>{user.disabled ? "Switch on…" : "Switch off…"}<span className="sr-only"> {user.name}</span></Button>}
                </Buttons>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {asked?.what === "change" ? <ChangeUser user={asked.user} onClose={close} /> : null}
      {asked?.what === "password" ? (
        <ConfirmChange title={`New one-time password for ${asked.user.name}`} action="Make and show it" onClose={close} onConfirm={() => change(asked.user, { newPassword: true })}>
          The present password stops working and every sign-in of this account ends at once. At the next sign-in its owner chooses a password of their own.
        </ConfirmChange>
      ) : null}
      {asked?.what === "switch" ? (
        <ConfirmChange title={asked.user.disabled ? `Switch ${asked.user.name} on` : `Switch ${asked.user.name} off`} action={asked.user.disabled ? "Switch on" : "Switch off"} variant={asked.user.disabled ? "lead" : "stop"} onClose={close}
          onConfirm={() => change(asked.user, { disabled: !asked.user.disabled })}>
          {asked.user.disabled ? "The account can sign in again with its password." : "Every sign-in and bench token of this account stops at once. What this person did stays in the log under their name; nothing is deleted."}
        </ConfirmChange>
      ) : null}
      <OneTimePassword shown={shown} onClose={() => setShown(null)} />
    </>
  );
}

/** The role with what the account carries: the only cases it sees, and its last day. */
function RoleCell({ user: { role, cases, endsOn, ended } }: { user: UserView }) {
  const { refs, more } = namedCases(cases ?? []);
  return (
    <>
      {role}
      {cases ? <span className="block max-w-[30ch] text-t2 text-ink-2">only {cases.length > 0 ? refs.map((ref, i) => <Fragment key={ref}>{i > 0 ? ", " : ""}<span className="font-mono">{ref}</span></Fragment>) : "an empty list of cases"}{more > 0 ? ` and ${more} more` : ""}</span> : null}
      {endsOn ? <span className="block text-t2 text-ink-2">{ended ? "ended on" : "until"} {dayInWords(endsOn)}</span> : null}
    </>
  );
}

function State({ user }: { user: UserView }) {
  if (user.disabled) return <><Mark kind="aside" /> Switched off</>;
  if (user.ended) return <><Mark kind="aside" /> Ended</>;
  if (user.mustChangePassword) return <><Mark kind="wait" /> Has a one-time password</>;
  return <><Mark kind="done" className="[--hole:var(--paper)]" /> Can sign in</>;
}
