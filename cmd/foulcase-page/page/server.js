// The language server in its worker, as a transport of an LSPClient.

import { loadModel } from "./model.js";

// startServer starts the worker and gives it the program and the model. The result is
// the transport; it throws where something is missing. Progress is told what share of
// the model is here, from 0 to 1. Ended is told why, when the server breaks off later.
export async function startServer(progress, ended) {
  const [module, model] = await Promise.all([
    WebAssembly.compileStreaming(fetch("foulcase.wasm")),
    loadModel(progress),
  ]);
  progress(1);
  const worker = new Worker("worker.js");
  const handlers = new Set();
  await new Promise((resolve, reject) => {
    worker.onerror = (event) => reject(new Error(event.message || "the worker did not start"));
    worker.onmessage = ({ data }) => {
      if (data.failed) reject(new Error(data.failed));
      if (data.ready) resolve();
    };
    worker.postMessage({ module, model }, [model]);
  });
  worker.onerror = (event) => ended(event.message);
  worker.onmessage = ({ data }) => {
    if (typeof data === "string") handlers.forEach((handle) => handle(data));
    else ended(data.failed);
  };
  return {
    send: (text) => worker.postMessage(text),
    subscribe: (handle) => handlers.add(handle),
    unsubscribe: (handle) => handlers.delete(handle),
  };
}
