// The page's service worker: keeps a copy of the page's own files, the model aside
// (model.js keeps that), and hands it out where the server cannot be reached.
"use strict";
const kept = "foulcase-page";
const files = ["./", "style.css", "icon.svg", "page.js", "worker.js", "wasm_exec.js", "foulcase.wasm", "model.json"];

self.addEventListener("install", (event) => {
  self.skipWaiting();
  event.waitUntil(caches.open(kept).then((cache) => cache.addAll(files)));
});

self.addEventListener("activate", (event) => event.waitUntil(self.clients.claim()));

self.addEventListener("fetch", (event) => {
  const own = files.some((name) => new URL(name, self.registration.scope).href === event.request.url);
  if (own && event.request.method === "GET") event.respondWith(fresh(event.request));
});

// fresh is what the server has, or else the copy.
async function fresh(request) {
  const cache = await caches.open(kept);
  try {
    const response = await fetch(request);
    if (response.ok) await cache.put(request, response.clone());
    return response;
  } catch (unreachable) {
    const copy = await cache.match(request);
    if (copy) return copy;
    throw unreachable;
  }
}
