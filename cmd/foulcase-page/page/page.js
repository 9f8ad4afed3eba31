// Foulcase in a page: an editor, a language server in a worker, and the marks.

import { LSPClient } from "@codemirror/lsp-client";
import { EditorView, minimalSetup } from "codemirror";
import { cards } from "./card.js";
import { house, setHouse } from "./house.js";
import { listHouse, listMarks } from "./list.js";
import { look } from "./look.js";
import { judge, underlining } from "./marks.js";
import { paper } from "./papers.js";
import { startServer } from "./server.js";

const state = document.getElementById("state");
const loading = document.getElementById("loading");

// tell shows how things stand; data-state says it in a word.
function tell(word, text) {
  if (state.dataset.state === "ended") return;
  state.dataset.state = word;
  state.textContent = text;
}

const client = new LSPClient({
  timeout: 60_000, // ms; the first judgement of a long text takes its time
  initializationOptions: { house: house() },
});

const count = (n, one, many) => `${n} ${n === 1 ? one : many}`;

// refresh brings the marks up to the text.
async function refresh() {
  try {
    if (!(await judge(view))) return;
    clearTimeout(pondering);
    const { marks, queries } = listMarks(view);
    tell("ready", `Ready: ${count(marks, "mark", "marks")}, ${count(queries, "query", "queries")}`);
  } catch (err) {
    stop(err.message);
  }
}

function stop(why) {
  loading.hidden = true;
  clearTimeout(pondering);
  tell("ended", `Nothing is judged any more: ${why}. Keep your text and load the page again.`);
}

// keepUp has every change judged, and says so unless that is over at once.
let pondering;
const keepUp = EditorView.updateListener.of((update) => {
  if (!update.docChanged || !client.serverCapabilities) return;
  clearTimeout(pondering);
  pondering = setTimeout(() => {
    listMarks(view); // those that are left
    tell("judging", "Judging");
  }, 150); // ms
  setTimeout(refresh); // the client sees the change after this update
});

// changeHouse has other forms stand, here and in the server.
function changeHouse(words) {
  setHouse(words);
  showHouse();
  if (!client.serverCapabilities) return;
  client.notification("workspace/didChangeConfiguration", { settings: { foulcase: { house: house() } } });
  refresh();
}

const showHouse = () => listHouse(house(), (gone) => changeHouse(house().filter((word) => word !== gone)));
const letStand = (word) => changeHouse([...house(), word]);

const view = new EditorView({
  doc: paper,
  extensions: [
    minimalSetup,
    EditorView.lineWrapping,
    EditorView.contentAttributes.of({ "aria-labelledby": "text-title", spellcheck: "false" }),
    look,
    underlining,
    keepUp,
    cards(letStand),
    client.plugin("untitled:night-orders.txt", "plaintext"),
  ],
  // In a shadow root the editor's styles are sheets of the document's objects, which the
  // page's Content-Security-Policy need not make an exception for.
  parent: document.getElementById("text").attachShadow({ mode: "open" }),
});

function showLoading(share) {
  loading.hidden = share === 1;
  loading.value = share;
  tell("loading", share < 1 ? `Loading the model: ${Math.floor(100 * share)} %` : "Opening the model");
}

async function start() {
  showHouse();
  showLoading(0);
  try {
    const transport = await startServer(showLoading, stop);
    tell("judging", "Judging");
    await client.connect(transport).initializing;
  } catch (err) {
    stop(err.message);
    return;
  }
  refresh();
}

start();
navigator.serviceWorker?.register("offline.js").catch((err) => console.warn("the page will not work offline:", err));
