// A web server for the built page, on this machine alone.

import { createServer } from "node:http";
import { readFile } from "node:fs/promises";
import { extname, join } from "node:path";

const types = {
  ".html": "text/html; charset=utf-8",
  ".css": "text/css",
  ".js": "text/javascript",
  ".json": "application/json",
  ".svg": "image/svg+xml",
  ".wasm": "application/wasm",
  ".fcm": "application/octet-stream",
};

// serve hands out the files of a folder. The result has the address (url), how often
// each file was asked for (asked, by name), close(), and damage, a function that tests
// set to spoil the bytes of a file.
export async function serve(folder) {
  const site = { asked: {}, damage: (name, bytes) => bytes };
  const server = createServer(async (request, response) => {
    const name = new URL(request.url, "http://localhost").pathname.slice(1) || "index.html";
    site.asked[name] = (site.asked[name] ?? 0) + 1;
    try {
      if (name.includes("/")) throw new Error("there are no folders");
      const bytes = site.damage(name, await readFile(join(folder, name)));
      response.writeHead(200, { "Content-Type": types[extname(name)], "Content-Length": bytes.length, "Cache-Control": "no-cache" });
      response.end(bytes);
    } catch {
      response.writeHead(404).end();
    }
  });
  await new Promise((resolve) => server.listen(0, "127.0.0.1", resolve));
  site.url = `http://127.0.0.1:${server.address().port}/`;
  site.close = () => {
    server.closeAllConnections();
    return new Promise((resolve) => server.close(resolve));
  };
  return site;
}
