// The language server behind a web socket: one message of the protocol is one message of the socket, and the server
// gets it with its length before it, as it does on standard input. A socket has a server of its own.
import { spawn } from "node:child_process";

/** Cuts what a server writes into messages. */
export class Frames {
  constructor(onMessage) {
    this.onMessage = onMessage;
    this.rest = Buffer.alloc(0);
  }

  push(bytes) {
    this.rest = Buffer.concat([this.rest, bytes]);
    for (;;) {
      const end = this.rest.indexOf("\r\n\r\n");
      if (end < 0) return;
      const length = /content-length: *(\d+)/i.exec(this.rest.subarray(0, end).toString("latin1"));
      if (!length) throw new Error("a message of the server has no length");
      const start = end + 4;
      const stop = start + Number(length[1]);
      if (this.rest.length < stop) return;
      this.onMessage(this.rest.subarray(start, stop).toString("utf8"));
      this.rest = this.rest.subarray(stop);
    }
  }
}

/** Starts the server for a socket; they end together. */
export function bridge(socket, [command, ...words], folder) {
  const server = spawn(command, words, { cwd: folder, stdio: ["pipe", "pipe", "inherit"] });
  const frames = new Frames((message) => socket.send(message));
  server.stdout.on("data", (bytes) => frames.push(bytes));
  server.stdin.on("error", () => socket.close());
  server.on("error", (error) => {
    console.error(`${command} does not start: ${error.message}`);
    socket.close();
  });
  server.on("exit", () => socket.close());
  socket.on("message", (data) => {
    const message = Buffer.from(data.toString(), "utf8");
    server.stdin.write(`Content-Length: ${message.length}\r\n\r\n`);
    server.stdin.write(message);
  });
  socket.on("close", () => server.kill());
}
