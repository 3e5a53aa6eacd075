import { createTransport } from "nodemailer";
import { env } from "@/lib/env";
import type { SmtpSettings } from "@/lib/settings";
import { mailHtml } from "./mail-html";
import { newestSealIn } from "./seal-text";

export interface OutgoingMail {
  id: string;
  to: string;
  subject: string;
  text: string;
}
export type SendMail = (mail: OutgoingMail) => Promise<void>;

/** Milliseconds; the whole of it stays below the lease of a claimed mail. */
export const WHOLE_MS = 60_000;
const PATIENCE = { connect: 10_000, silence: 20_000, whole: WHOLE_MS };

const LOOPBACK = new Set(["127.0.0.1", "::1", "localhost"]);

/** One mail, one connection, within time limits. Rejects with what the mail server or the network said. */
export function mailSender(smtp: SmtpSettings, publicUrl: string, workshop: string, patience = PATIENCE): SendMail {
  const host = new URL(publicUrl).hostname.replace(/[[\]]/g, "");
  return async ({ id, to, subject, text }) => {
    let begun = false;
    const transport = createTransport({
      // the one way to learn that the message itself was on its way
      transactionLog: true, logger: listener((said) => void (begun ||= said === "DATA")),
      host: smtp.host, port: smtp.port, secure: smtp.secure, auth: smtp.user && smtp.password ? { user: smtp.user, pass: smtp.password } : undefined,
      // a password never crosses a network in the clear
      requireTLS: smtp.user !== null && !LOOPBACK.has(smtp.host), ignoreTLS: smtp.fake,
      connectionTimeout: patience.connect, greetingTimeout: patience.connect, dnsTimeout: patience.connect, socketTimeout: patience.silence,
      disableFileAccess: true, disableUrlAccess: true,
    });
    let timer: NodeJS.Timeout | undefined;
    const late = new Promise<never>((_, reject) => {
      timer = setTimeout(() => reject(new Error("the mail server took longer than a minute")), patience.whole);
    });
    const sent = transport.sendMail({
      from: smtp.from, to: { name: "", address: to }, subject, text, html: mailHtml(text, { subject, workshop }),
      // the same mail sent twice can be told by its id
      messageId: `<${id}@${host}>`, headers: { "Auto-Submitted": "auto-generated", ...sealHeader(text) },
    });
    sent.catch(() => {});
    try {
      await Promise.race([sent, late]);
    } catch (error) {
      throw begun && (error as { responseCode?: number }).responseCode === undefined ? Object.assign(error as Error, { maybeTaken: true }) : error;
    } finally {
      clearTimeout(timer);
      transport.close();
    }
  };
}

/** The newest seal that the text ends with, where a program finds it too. */
function sealHeader(text: string): Record<string, string> {
  const seal = newestSealIn(text);
  return seal ? { "X-Twinread-Seal": `${seal.number} ${seal.sha256}` } : {};
}

export const sendMail: SendMail = (mail) => mailSender(env().smtp, env().publicUrl, env().workshop)(mail);

function listener(hear: (said: unknown) => void) {
  const ignore = () => {};
  return { level: ignore, trace: ignore, debug: (_entry: unknown, said: unknown) => hear(said), info: ignore, warn: ignore, error: ignore, fatal: ignore };
}

/** True when it broke off after the message had left: the receiver may have taken it on and could not say so. */
export function maybeTaken(error: unknown): boolean {
  return (error as { maybeTaken?: boolean } | null)?.maybeTaken === true;
}

/** True when the mail server has said for good that it will not take this mail. */
export function refusedForGood(error: unknown): boolean {
  const { code, responseCode } = (error ?? {}) as { code?: string; responseCode?: number };
  return (code === "EENVELOPE" || code === "EMESSAGE") && responseCode !== undefined && responseCode >= 500 && responseCode < 600;
}
