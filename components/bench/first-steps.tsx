import { Fragment } from "react";
import { ButtonLink } from "@/components/ui/button";
import { Mark } from "@/components/ui/mark";
import { Section } from "@/components/ui/section";
import type { FirstStep } from "@/lib/core/first-steps";

const FILE = <>the file <span className="font-mono">.env</span> beside <span className="font-mono">.env.example</span>, which explains each setting. Then stop Twinread and start it again.</>;

/** For the admin of a new workshop: what is still to be seen to, with the way there. */
export function FirstSteps({ steps, missing }: { steps: readonly FirstStep[]; missing: readonly string[] }) {
  if (steps.length === 0) return null;
  return (
    <Section first title="First steps" note="Only admins see this. A line goes when it is done.">
      <ol className="next-steps">{steps.map((step, i) => <li key={step}><Mark kind="run" /><Words step={step} missing={missing} lead={i === 0} /></li>)}</ol>
    </Section>
  );
}

function Words({ step, missing, lead }: { step: FirstStep; missing: readonly string[]; lead: boolean }) {
  const variant = lead ? "lead" : "plain";
  switch (step) {
    case "nobody-approves":
      return (
        <>
          <span><b>Make the accounts for the bench.</b> Your admin account looks after accounts and rules; it touches no case. A technician records cases and reads chips. A lead does the same and approves what may be written. Whoever reads a chip can’t approve its image, so two people are needed. If you work alone, make one lead for yourself; this page then says what to do about the rule.</span>
          <ButtonLink variant={variant} href="/users">Go to Users</ButtonLink>
        </>
      );
    case "one-person":
      return (
        <>
          <span><b>Only one person works at the bench, and the two-person rule is on.</b> Whoever reads a chip can’t approve its image, so nothing could ever be written. Make an account for a second person under Users; or, if you do work alone, switch the rule off under Policy. Every approval, log, bundle and summary then says so.</span>
          <ButtonLink variant={variant} href="/policy">Go to Policy</ButtonLink>
        </>
      );
    case "mail":
      return (
        <>
          <span><b>Set a mail server.</b> Until then mails reach nobody: they are kept on this machine, and customers get no link and no summary. Put <span className="font-mono">SMTP_URL</span> and <span className="font-mono">SMTP_FROM</span> into {FILE}</span>
          <ButtonLink variant={variant} href="/outbox">Go to Outbox</ButtonLink>
        </>
      );
    case "settings":
      return (
        <>
          <span><b>Say who the workshop is.</b> Customers read it on the request form, on the slip for the parcel and on the summary. Put {missing.map((name, i) => <Fragment key={name}>{i > 0 ? ", " : ""}<span className="font-mono">{name}</span></Fragment>)} into {FILE} Where the times at the foot of a page are not yours, set <span className="font-mono">WORKSHOP_TIME_ZONE</span> there, too.</span>
          <span />
        </>
      );
  }
}
