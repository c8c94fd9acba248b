// Serves one spec as a page that edits it, on this machine only.
// usage: node serve.mjs SPEC.shaft [PORT]      LAYSHAFT names the command where it is not on the path
import fs from "node:fs";
import http from "node:http";
import path from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import esbuild from "esbuild";
import { WebSocketServer } from "ws";
import { bridge } from "./bridge.mjs";

const here = path.dirname(fileURLToPath(import.meta.url));

/** The nearest folder above with a layshaft.toml, else the spec's own. */
function rootOf(spec) {
  for (let folder = path.dirname(spec); ; folder = path.dirname(folder)) {
    if (fs.existsSync(path.join(folder, "layshaft.toml"))) return folder;
    if (folder === path.dirname(folder)) return path.dirname(spec);
  }
}

async function page(spec) {
  const built = await esbuild.build({
    entryPoints: [path.join(here, "page.js")],
    bundle: true,
    format: "esm",
    write: false,
    logLevel: "error",
  });
  const place = { spec: pathToFileURL(spec).href, root: pathToFileURL(rootOf(spec)).href };
  const html = fs
    .readFileSync(path.join(here, "page.html"), "utf8")
    .replace("{{name}}", path.basename(spec).replace(/[<>&"]/g, "_"))
    .replace("{{place}}", JSON.stringify(place).replace(/</g, "\\u003c"));
  return { "/": ["text/html", html], "/page.js": ["text/javascript", built.outputFiles[0].text] };
}

/** The address at which the spec is served, and what ends it. */
export async function serve(file, port = 0, command = [process.env.LAYSHAFT || "layshaft", "lsp"]) {
  const spec = fs.realpathSync(file);
  const answers = await page(spec);
  const server = http.createServer((request, response) => {
    const answer = answers[request.url];
    // A name other than this machine's own is a page from elsewhere that tries its luck.
    if (request.headers.host !== address()) return response.writeHead(403).end();
    if (request.url === "/spec" && request.method === "GET") return response.end(fs.readFileSync(spec));
    if (request.url === "/spec" && request.method === "PUT") return save(request, response, spec);
    if (!answer) return response.writeHead(404).end();
    response.writeHead(200, { "content-type": `${answer[0]}; charset=utf-8` }).end(answer[1]);
  });
  const address = () => `127.0.0.1:${server.address().port}`;
  const sockets = new WebSocketServer({ server, path: "/lsp", verifyClient: ({ origin }) => origin === `http://${address()}` });
  sockets.on("connection", (socket) => bridge(socket, command, path.dirname(spec)));
  await new Promise((ready) => server.listen(port, "127.0.0.1", ready));
  const stop = () => {
    for (const socket of sockets.clients) socket.terminate();
    server.close();
    server.closeAllConnections();
  };
  return { url: `http://${address()}/`, stop };
}

/** Takes the text of the page, at most 10 MB, as the language has it. */
function save(request, response, spec) {
  const parts = [];
  let length = 0;
  if (request.headers.origin !== `http://${request.headers.host}`) return response.writeHead(403).end();
  request.on("data", (part) => {
    length += part.length;
    if (length > 10_000_000) request.destroy();
    parts.push(part);
  });
  request.on("end", () => {
    fs.writeFileSync(spec, Buffer.concat(parts));
    response.writeHead(204).end();
  });
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const [file, port] = process.argv.slice(2);
  if (!file) {
    console.error("usage: node serve.mjs SPEC.shaft [PORT]");
    process.exit(2);
  }
  const { url } = await serve(file, Number(port) || 0);
  console.log(`${file} is at ${url}`);
}
