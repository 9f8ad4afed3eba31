// Runs the language server, away from the page's own thread. The first message
// brings {module, model}: the compiled program and the bytes of the model. All
// others, in both directions, are texts: messages of the Language Server Protocol.
// Besides, the page is told {ready: true}, or {failed: why}.
"use strict";
importScripts("wasm_exec.js");

const failed = (why) => postMessage({ failed: String(why) });

// Nothing here holds on to the model: the program copies it and deletes this one.
self.onmessage = ({ data }) => {
  const waiting = [];
  self.onmessage = ({ data }) => waiting.push(data);
  self.foulcase = {
    model: new Uint8Array(data.model),
    send: (text) => postMessage(text),
    started(receive) {
      self.onmessage = ({ data }) => receive(data);
      waiting.forEach((text) => receive(text));
      postMessage({ ready: true });
    },
    failed,
  };
  run(data.module).then(() => failed("the server has ended"), failed);
};

async function run(module) {
  const go = new Go();
  await go.run(await WebAssembly.instantiate(module, go.importObject));
}
