"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import type { z } from "zod";
import { Button, Buttons } from "@/components/ui/button";
import { Checkbox } from "@/components/ui/checkbox";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { Section } from "@/components/ui/section";
import { useSay } from "@/components/ui/toast";
import type { Policy } from "@/lib/core/words";
import { Refusal, send } from "@/lib/http/send";
import { type PolicyInput, policyInput } from "@/lib/schemas/policy";
import { NUMBER_RULES, SECOND_FACTOR, TWO_PERSON } from "./rules";

const GROUPS = [
  { title: "Before a write", note: "What an approval asks for.", keys: ["reads", "seatings"] },
  { title: "After a write", note: "What a verified transfer asks for.", keys: ["readBacks", "readBackSeatings"] },
  { title: "How long", note: "What leaves the house, and what is kept.", keys: ["shareDays", "erasureDays"] },
];

/** The admin's form. A stricter rule counts at once, also for chips that are already on their way. */
export function PolicyForm({ policy }: { policy: Policy }) {
  const router = useRouter();
  const say = useSay();
  const [refusal, setRefusal] = useState<string | null>(null);
  const { register, control, handleSubmit, reset, formState: { errors, isSubmitting, isDirty } } = useForm<z.input<typeof policyInput>, unknown, PolicyInput>({ resolver: zodResolver(policyInput), defaultValues: { ...policy, secondFactor: false } });
  const twoPeople = useWatch({ control, name: "twoPersonRule" });
  const submit = handleSubmit(async (input) => {
    setRefusal(null);
    try {
      await send("PUT", "/api/policy", input);
      reset(input);
      router.refresh();
      say({ text: "The policy is changed, and the log says from what to what." });
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    }
  });
  return (
    <form onSubmit={submit} noValidate>
      {GROUPS.map((group) => (
        <Section key={group.title} title={group.title} note={group.note}>
          <div className="grid grid-cols-2 gap-x-8 gap-y-5 phone:grid-cols-1">
            {NUMBER_RULES.filter((rule) => group.keys.includes(rule.key)).map((rule) => (
              <Input key={rule.key} label={rule.label} type="number" inputMode="numeric" min={rule.min} max={rule.max} step={1} hint={`${rule.why} ${rule.decides}`} error={errors[rule.key]?.message} {...register(rule.key)} />
            ))}
          </div>
        </Section>
      ))}
      <Section title="Who" note="Two people, always, unless switched off here.">
        <div className="grid max-w-[76ch] gap-4">
          <Checkbox label={<><b className="block">{TWO_PERSON.label}</b>{TWO_PERSON.why}</>} {...register("twoPersonRule")} />
          {twoPeople ? null : <Note kind="caution" title="One pair of eyes then decides.">Switch it off only where nobody else could sign. Approvals given meanwhile carry it for ever.</Note>}
          <p className="text-ink-2"><b>{SECOND_FACTOR.label}: off.</b> {SECOND_FACTOR.why}</p>
        </div>
      </Section>
      <Section strong title="Change" note="Goes into the workshop’s custody log.">
        <div className="grid gap-3.5">
          <p>A stricter rule counts at once: chips waiting for approval may ask for more reads. Approvals that stand are not touched.</p>
          {refusal ? <Note kind="block" role="alert" title="Nothing was changed.">{refusal}</Note> : null}
          <Buttons><Button type="submit" variant="lead" disabled={isSubmitting} reason={isDirty ? null : "Nothing differs from the policy that holds now."}>Change the policy</Button></Buttons>
        </div>
      </Section>
    </form>
  );
}
