"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { Button, Buttons } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Mark } from "@/components/ui/mark";
import { Note } from "@/components/ui/note";
import { momentText } from "@/components/ui/times";
import { useSay } from "@/components/ui/toast";
import { Refusal, send } from "@/lib/http/send";
import { tokenInput } from "@/lib/schemas/user";
import type { BenchTokenView } from "@/lib/views";
import { NewToken } from "./new-token";

/** Tokens for bench stations: each acts with the rights of its owner until it is withdrawn. */
export function BenchTokens({ tokens, timeZone }: { tokens: readonly BenchTokenView[]; timeZone: string }) {
  const router = useRouter();
  const say = useSay();
  const [refusal, setRefusal] = useState<string | null>(null);
  const [made, setMade] = useState<{ name: string; token: string } | null>(null);
  const { register, handleSubmit, reset, formState: { errors, isSubmitting } } = useForm<{ name: string }>({ resolver: zodResolver(tokenInput), defaultValues: { name: "" } });

  async function doing(run: () => Promise<void>) {
    setRefusal(null);
    try {
      await run();
      router.refresh();
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    }
  }
  const submit = handleSubmit((input) => doing(async () => {
    setMade(await send<{ name: string; token: string }>("POST", "/api/account/tokens", input));
    reset();
  }));
  const withdraw = (token: BenchTokenView) => doing(async () => {
    await send("DELETE", `/api/account/tokens/${token.id}`);
    say({ text: `“${token.name}” is withdrawn and opens nothing any more.` });
  });

  return (
    <div className="grid gap-5">
      <form onSubmit={submit} noValidate className="grid max-w-[560px] gap-3">
        <Input label="Name of the bench or script it is for" autoComplete="off" error={errors.name?.message} {...register("name")} />
        <Buttons><Button type="submit" disabled={isSubmitting}>Make a bench token</Button></Buttons>
      </form>
      {refusal ? <Note kind="block" role="alert" title="This was not done.">{refusal}</Note> : null}
      {made ? <NewToken made={made} onClose={() => setMade(null)} /> : null}
      {tokens.length > 0 ? (
        <table className="ruled lines">
          <caption className="sr-only">Bench tokens</caption>
          <thead><tr><th scope="col">Name</th><th scope="col">Made</th><th scope="col">Last used</th><th scope="col">State</th><th scope="col"><span className="sr-only">Withdraw</span></th></tr></thead>
          <tbody>
            {tokens.map((token) => (
              <tr key={token.id} className={token.withdrawnAt ? "is-aside" : ""}>
                <th scope="row">{token.name}</th>
                <td data-l="Made">{momentText(token.createdAt, timeZone)}</td>
                <td data-l="Last used">{token.lastUsedAt ? momentText(token.lastUsedAt, timeZone) : "never"}</td>
                <td>{token.withdrawnAt ? <><Mark kind="aside" /> Withdrawn {momentText(token.withdrawnAt, timeZone)}</> : <><Mark kind="done" className="[--hole:var(--paper)]" /> In use</>}</td>
                <td className="num">{token.withdrawnAt ? null : <Button size="small" variant="stop" onClick={() => void withdraw(token)}>Withdraw<span className="sr-only"> {token.name}</span></Button>}</td>
              </tr>
            ))}
          </tbody>
        </table>
      ) : <p className="text-ink-2">You have no bench tokens.</p>}
    </div>
  );
}
