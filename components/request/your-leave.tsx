"use client";

import { Button } from "@/components/ui/button";
import { consentWords } from "@/lib/core/request-words";
import { draftStore } from "./draft";
import { type FormState, Line, Part, Tick } from "./form-parts";

/** Consents and the typed signature; what is done with the customer's data stands right above it. */
export function YourLeave({ form, keepDays, today, workshop, ask }: { form: FormState; keepDays: number; today: string; workshop: string; ask: string }) {
  const { name, signature } = form.draft;
  return (
    <Part number={6} title="Your leave to do the work">
      <div className="grid gap-3.5">
        <Tick form={form} name="consentOwner" label={consentWords("owner", keepDays)} />
        <Tick form={form} name="consentRead" label={consentWords("read", keepDays)} />
        <Tick form={form} name="consentWrite" label={consentWords("write", keepDays)} />
        <Tick form={form} name="consentSolder" label={consentWords("solder", keepDays)} />
        <details className="border-l-4 border-rule pl-3 text-t2 text-ink-2" open>
          <summary className="cursor-pointer font-semibold text-ink">What we do with your data</summary>
          <p className="pt-1">{workshop} keeps what you type here, your photos and the images of the chips to do this job and for nothing else. Nobody outside gets them, save whoever the law says. Images are kept until {keepDays} days after the drive has gone back, and erased by hand once that day has come; what has to be kept longer, such as bills, local law says. A log of every step stays, with check numbers of the images and without your name. On your private page you can ask for deletion at any time. Whom to ask: {ask}. You can also turn to the authority for data protection where you live.</p>
        </details>
        <div className="rq-grid">
          <Line form={form} name="signature" label="Type your name as signature" autoComplete="off" max={200} wayOut={name.trim() && !signature ? <Button variant="text" size="small" className="!min-h-0 !py-0" onClick={() => draftStore.set({ signature: name.trim() })}>Use {name.trim()}</Button> : null} />
          <div className="grid content-start gap-1"><span className="min-h-5 text-t2 leading-5 font-semibold">Date</span><span className="py-2">{today}</span></div>
        </div>
      </div>
    </Part>
  );
}
