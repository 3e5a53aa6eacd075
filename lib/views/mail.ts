export interface MailView {
  id: string;
  to: string;
  subject: string;
  /** secret links masked */
  text: string;
  /** the same as mail programs show it */
  html: string;
  /** it may have arrived twice: a server stopped between the receiver's yes and our note of it */
  possibleDuplicate: boolean;
  state: "queued" | "sending" | "sent" | "dead";
  attempts: number;
  queuedAt: string;
  sentAt: string | null;
  lastError: string | null;
}
