"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { Button, Buttons } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { useSay } from "@/components/ui/toast";
import { Refusal, send } from "@/lib/http/send";
import { MIN_PASSWORD_CHARACTERS } from "@/lib/limits";
import { type PasswordInput, passwordInput } from "@/lib/schemas/user";

/** `mustChoose`: the present password was handed out by an admin and opens nothing but this page. */
export function PasswordForm({ email, mustChoose }: { email: string; mustChoose: boolean }) {
  const router = useRouter();
  const say = useSay();
  const [refusal, setRefusal] = useState<string | null>(null);
  const { register, handleSubmit, reset, setError, formState: { errors, isSubmitting } } = useForm<PasswordInput>({ resolver: zodResolver(passwordInput), defaultValues: { current: "", next: "" } });
  const submit = handleSubmit(async (input) => {
    setRefusal(null);
    try {
      await send("POST", "/api/account/password", input);
      reset();
      say({ text: "Your password is changed. Your other sign-ins have ended." });
      if (mustChoose) router.replace("/bench");
      else router.refresh();
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      const known = error.problem.errors?.filter((e) => e.path === "current" || e.path === "next") ?? [];
      for (const { path, message } of known) setError(path as keyof PasswordInput, { message });
      if (known.length === 0) setRefusal(error.detail);
    }
  });
  return (
    <form onSubmit={submit} noValidate className="grid max-w-[440px] gap-4">
      <input type="email" name="username" autoComplete="username" value={email} readOnly hidden />
      <Input label={mustChoose ? "One-time password" : "Present password"} type="password" autoComplete="current-password" error={errors.current?.message} {...register("current")} />
      <Input label="New password" type="password" autoComplete="new-password" hint={`At least ${MIN_PASSWORD_CHARACTERS} characters; a few words are fine.`} error={errors.next?.message} {...register("next")} />
      {refusal ? <Note kind="block" role="alert" title="The password stays as it was.">{refusal}</Note> : null}
      <Buttons><Button type="submit" variant="lead" disabled={isSubmitting}>{mustChoose ? "Choose this password" : "Change the password"}</Button></Buttons>
    </form>
  );
}
