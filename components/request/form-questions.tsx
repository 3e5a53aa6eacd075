"use client";

import { Button } from "@/components/ui/button";
import { likelyEmail } from "@/lib/core/look-alikes";
import { DAMAGE_WORDS, ENCLOSURE_WORDS, ENCLOSURES, IMPORTANCE_WORDS, IMPORTANCES, LOCK_WORDS, LOCKS } from "@/lib/core/request-words";
import { DAMAGES } from "@/lib/core/words";
import { draftStore } from "./draft";
import { Choice, type FormState, Line, Lines, Part, Tick } from "./form-parts";

interface Asked {
  form: FormState;
}

export function You({ form }: Asked) {
  const likely = likelyEmail(form.draft.email);
  return (
    <Part number={1} title="You">
      <div className="rq-grid">
        <Line form={form} name="name" label="Name" autoComplete="name" max={200} />
        <Line form={form} name="company" label="Company" aside="if there is one" autoComplete="organization" max={200} />
        <Line form={form} name="email" label="E-mail for the link and the summary" type="email" autoComplete="email" max={254}
          wayOut={likely ? <Button variant="text" size="small" className="!min-h-0 !py-0" onClick={() => draftStore.set({ email: likely })}>Use {likely}</Button> : null} />
        <Line form={form} name="phone" label="Phone" aside="if we have a question" type="tel" autoComplete="tel" max={60} />
        <Lines form={form} name="returnAddress" label="Address the parcel goes back to" className="whole" rows={3} autoComplete="street-address" max={1000} />
      </div>
    </Part>
  );
}

export function DriveLabel({ form }: Asked) {
  return (
    <Part number={2} title="The drive’s label">
      <div className="rq-grid">
        <Line form={form} name="partNumber" place="A" label="Part number on the enclosure" number max={120} />
        <Line form={form} name="serial" place="B" label="Serial number" number max={120} />
        <Line form={form} name="capacity" label="Capacity" hint="Such as 2 TB" max={40} />
        <Line form={form} name="made" label="Month and year made" aside="if printed" max={40} />
        <Line form={form} name="model" label="Model" aside="if printed" max={120} />
        <Line form={form} name="interface" label="Interface" aside="if you know it" hint="Such as SATA or USB" max={60} />
      </div>
      <p className="pt-3.5 text-t2 text-ink-2">One of part number, serial number and model is enough.</p>
    </Part>
  );
}

export function TheBoard({ form }: Asked) {
  return (
    <Part number={3} title="The board, and what was around it">
      <div className="rq-grid">
        <Line form={form} name="boardNumber" place="C" label="Board number" hint="Printed on the green side, not on a sticker." number max={120}
          wayOut={<Button variant="text" size="small" className="!min-h-0 !py-0" onClick={() => draftStore.set({ boardHidden: true })}>I can’t see it</Button>} />
        <Line form={form} name="boardRevision" label="Revision, next to it" number max={60} />
        <div className="whole"><Tick form={form} name="boardHidden" label={<>I can’t see the board number without taking the board off. <span className="text-ink-2">That’s fine; leave it on.</span></>} /></div>
        <Choice form={form} name="enclosure" of={ENCLOSURES} words={ENCLOSURE_WORDS} title="Was the drive in an enclosure?" />
        <Choice form={form} name="lock" of={LOCKS} words={LOCK_WORDS} title="Is a password or encryption on it?" />
        <p className="whole text-t2 text-ink-2">Send the enclosure with its small board, too: it may hold the key to your data. Please don’t write the password anywhere here; we don’t need it.</p>
      </div>
    </Part>
  );
}

export function WhatHappened({ form }: Asked) {
  return (
    <Part number={4} title="What happened">
      <Choice form={form} name="damage" of={DAMAGES} words={DAMAGE_WORDS} columns />
      <div className="rq-grid pt-3.5">
        <Lines form={form} name="happened" label="In your own words" aside="when, and how it showed" className="whole" max={2000} />
        <Lines form={form} name="tried" label="What was tried since?" hint="Opened? Powered again? Another board put on?" className="whole" max={2000} />
        <Choice form={form} name="importance" of={IMPORTANCES} words={IMPORTANCE_WORDS} title="How much hangs on it?" />
        <Line form={form} name="neededBy" label="Needed by" aside="if there is a day" type="date" />
      </div>
    </Part>
  );
}
