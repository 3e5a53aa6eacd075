import { createServer, type Server, type Socket } from "node:net";

/** What the receiving server does, and at which step of one mail. */
export type SinkFault = "none" | "refuses" | "hangs at greeting" | "hangs after data" | "421 at greeting" | "450 at recipient" | "550 at recipient" | "552 after data" | "cuts before its yes" | "cuts after its yes";
export type SinkStep = "connected" | "MAIL" | "RCPT" | "DATA" | "said yes";

/** A receiving mail server by hand: every byte that it says is ours, so that it can break off anywhere. */
export class MailSink {
  /** Message-IDs of what it has taken on, in order */
  readonly taken: string[] = [];
  fault: SinkFault = "none";
  /** called as soon as the step is reached, before anything is answered */
  onStep: (step: SinkStep) => void = () => {};
  private readonly sockets = new Set<Socket>();
  private constructor(private readonly server: Server, readonly port: number) {}

  static async open(): Promise<MailSink> {
    const server = createServer();
    await new Promise<void>((done) => server.listen(0, "127.0.0.1", done));
    const sink = new MailSink(server, (server.address() as { port: number }).port);
    server.on("connection", (socket) => sink.serve(socket));
    return sink;
  }

  async close(): Promise<void> {
    for (const socket of this.sockets) socket.destroy();
    await new Promise((done) => this.server.close(done));
  }

  private serve(socket: Socket): void {
    this.sockets.add(socket);
    socket.on("close", () => this.sockets.delete(socket));
    socket.on("error", () => {});
    const say = (line: string) => void socket.write(`${line}\r\n`);
    const { fault } = this;
    this.onStep("connected");
    if (fault === "refuses") return void socket.destroy();
    if (fault === "421 at greeting") return void (say("421 too busy"), socket.end());
    if (fault !== "hangs at greeting") say("220 sink");
    let [text, body] = ["", null as string | null];
    socket.on("data", (chunk) => {
      text += chunk.toString("latin1");
      for (let end = text.indexOf("\r\n"); end >= 0; end = text.indexOf("\r\n")) {
        const line = text.slice(0, end);
        text = text.slice(end + 2);
        if (body === null) {
          const command = line.slice(0, 4).toUpperCase();
          if (command === "MAIL" || command === "RCPT" || command === "DATA") this.onStep(command);
          if (command === "DATA") body = "";
          say(this.answer(command, fault));
        } else if (line !== ".") body += `${line}\n`;
        else {
          this.end(body, fault, socket, say);
          body = null;
        }
      }
    });
  }

  private answer(command: string, fault: SinkFault): string {
    if (command === "RCPT" && fault === "450 at recipient") return "450 try later";
    if (command === "RCPT" && fault === "550 at recipient") return "550 no such mailbox";
    return command === "DATA" ? "354 go on" : command === "QUIT" ? "221 bye" : "250 fine";
  }

  private end(body: string, fault: SinkFault, socket: Socket, say: (line: string) => void): void {
    if (fault === "hangs after data") return;
    if (fault === "552 after data") return say("552 too large for this mailbox");
    if (fault === "cuts before its yes") return void socket.destroy();
    this.taken.push(/^message-id:\s*<([^@>]+)@/im.exec(body)?.[1] ?? "none");
    if (fault === "cuts after its yes") return void socket.destroy();
    say("250 taken");
    this.onStep("said yes");
  }
}
