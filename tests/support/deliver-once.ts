import { deliverMails } from "@/lib/commands/deliver-mails";
import { mailSender } from "@/lib/mail/transport";

// A sender in a process of its own, to be killed at any step: node … deliver-once.ts PORT
const port = Number(process.argv[2]);
await deliverMails(mailSender({ host: "127.0.0.1", port, secure: false, user: null, password: null, from: "desk@bench.example", fake: true }, "https://bench.example", "Bench"));
process.exit(0);
