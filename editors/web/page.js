// The page: an editor with a spec in it, its language server behind a socket. Ctrl-S writes the file.
import { LSPClient, languageServerExtensions } from "@codemirror/lsp-client";
import { keymap } from "@codemirror/view";
import { EditorView, basicSetup } from "codemirror";
import { safe } from "./safe.js";
import { shaft } from "./shaft.js";

const place = JSON.parse(document.getElementById("place").textContent);
const state = (text) => (document.getElementById("state").textContent = text);

/**
 * The client says that it asks for findings itself, and never does (seen with lsp-client 6.3); a server that believes it
 * sends none. So that is left out of what it says.
 */
function modest(message) {
  const { method, params } = JSON.parse(message);
  return method === "initialize" && params.capabilities.textDocument
    ? JSON.stringify(JSON.parse(message, (key, value) => (key === "diagnostic" ? undefined : value)))
    : message;
}

/** Each message of the socket is one message of the protocol. */
function transport(url) {
  const socket = new WebSocket(url);
  const handlers = new Set();
  socket.onmessage = (event) => handlers.forEach((handler) => handler(event.data));
  socket.onclose = () => state("The language server has ended. Reload the page to start it again.");
  return new Promise((ready) => {
    socket.onopen = () =>
      ready({
        send: (message) => socket.send(modest(message)),
        subscribe: (handler) => handlers.add(handler),
        unsubscribe: (handler) => handlers.delete(handler),
      });
  });
}

async function save(view) {
  const answer = await fetch("/spec", { method: "PUT", body: view.state.doc.toString() });
  state(answer.ok ? "Saved." : "It could not be saved.");
}

const text = await (await fetch("/spec")).text();
const client = new LSPClient({ rootUri: place.root, extensions: languageServerExtensions(), sanitizeHTML: safe });
client.connect(await transport(`ws://${location.host}/lsp`));
const keys = keymap.of([{ key: "Mod-s", preventDefault: true, run: (view) => (save(view), true) }]);
window.view = new EditorView({
  doc: text,
  extensions: [keys, basicSetup, shaft, client.plugin(place.spec, "shaft")],
  parent: document.getElementById("editor"),
});
await client.initializing;
state("Hover for values, Ctrl-Space to complete, F2 to rename, F12 to go there, Shift-Alt-F to format, Ctrl-S to save.");
