"use client";

import { Button, Buttons } from "@/components/ui/button";
import { CopyButton } from "@/components/ui/copy-button";
import { Note } from "@/components/ui/note";

/** The token, once, with a line that shows it works. Rendered after a click only, so the browser's own address is there. */
export function NewToken({ made, onClose }: { made: { name: string; token: string }; onClose(): void }) {
  const example = `curl -H "Authorization: Bearer ${made.token}" ${window.location.origin}/api/cases`;
  return (
    <div className="grid gap-3 border border-rule-2 bg-sheet px-4 py-3.5" role="status">
      <p><b>Token for “{made.name}”</b></p>
      <p className="flex items-center gap-2"><code className="font-semibold [overflow-wrap:anywhere]">{made.token}</code><CopyButton text={made.token} label="Copy the token" done="Copied the token." /></p>
      <div>
        <p className="text-t2 text-ink-2">Try it on the bench computer: this lists the cases.</p>
        <p className="flex items-start gap-2"><code className="text-t2 [overflow-wrap:anywhere]">{example}</code><CopyButton text={example} label="Copy the command" done="Copied the command." /></p>
      </div>
      <Note kind="caution" title="It is shown only now.">It is stored as a hash. Keep it where only this bench can read it; whoever holds it acts in your name.</Note>
      <Buttons><Button onClick={onClose}>I have stored it</Button></Buttons>
    </div>
  );
}
