import { MailPreview } from "./mail-preview";

/** What is written when, with invented facts. */
export function TemplateList({ templates }: { templates: readonly { kind: string; when: string; subject: string; text: string; html: string }[] }) {
  return (
    <ul className="border-t border-rule">
      {templates.map(({ kind, when, subject, text, html }) => (
        <li key={kind} className="border-b border-rule py-2">
          <details>
            <summary className="grid cursor-pointer grid-cols-[minmax(0,2fr)_minmax(0,3fr)] gap-x-4 phone:grid-cols-[minmax(0,1fr)]"><b>{when}</b><span className="text-ink-2 [overflow-wrap:anywhere]">{subject}</span></summary>
            <div className="pt-2.5"><MailPreview subject={subject} text={text} html={html} /></div>
          </details>
        </li>
      ))}
    </ul>
  );
}
