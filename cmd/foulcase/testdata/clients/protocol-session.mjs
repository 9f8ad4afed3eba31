// Sessions of a client of the protocol with foulcase, for clients_test.go, in the
// position encoding that the command line names. It opens $DOCUMENT, corrects $CORRECT
// by a code action, makes $HOUSE a house word in its settings, and writes what it is
// told after each step to $REPORT, as JSON. What the protocol asks for besides is
// asserted here.
import assert from "node:assert/strict";
import { spawn } from "node:child_process";
import { once } from "node:events";
import { appendFile, readFile, writeFile } from "node:fs/promises";
import { pathToFileURL } from "node:url";
import lsp from "vscode-languageserver-protocol/node";

const patience = 30_000; // milliseconds for each step
const units = process.argv[2];
const { DOCUMENT: name, MARKS: count, CORRECT: misspelt, HOUSE: houseWord, REPORT: reportName } = process.env;
const uri = pathToFileURL(name).href;
const frames = [];

// within waits for a promise, and fails when it takes too long.
function within(what, promise) {
  let timer;
  const late = new Promise((_, fail) => {
    timer = setTimeout(() => fail(new Error(`${what} is waited for in vain`)), patience);
  });
  return Promise.race([promise, late]).finally(() => clearTimeout(timer));
}

// start runs a server and returns a connection to it, and its end: the exit code.
function start() {
  const server = spawn("foulcase", ["editor"], { stdio: ["pipe", "pipe", "inherit"] });
  const end = once(server, "exit").then(([code]) => code);
  const connection = lsp.createProtocolConnection(
    new lsp.StreamMessageReader(server.stdout), new lsp.StreamMessageWriter(server.stdin));
  server.stdout.on("data", (data) => frames.push(`< ${data}`));
  const write = server.stdin.write.bind(server.stdin);
  server.stdin.write = (data, ...rest) => {
    frames.push(`> ${data}`);
    return write(data, ...rest);
  };
  return { connection, server, end, ask: (type, params, token) => within(type.method, connection.sendRequest(type, params, token)) };
}

// bytesOf and unitsOf turn a column of a line from and to what the encoding counts.
const encoding = units === "utf-8" ? "utf8" : "utf16le";
const wide = units === "utf-8" ? 1 : 2;
const cut = (line, start, stop) => Buffer.from(line, encoding).subarray(start * wide, stop * wide).toString(encoding);
const width = (line) => Buffer.from(line, encoding).length / wide;

// edited is a text with one edit made in it.
function edited(text, { range, newText }) {
  const lines = text.split("\r\n");
  const first = lines[range.start.line], last = lines[range.end.line];
  const joined = cut(first, 0, range.start.character) + newText + cut(last, range.end.character, width(last));
  lines.splice(range.start.line, range.end.line - range.start.line + 1, joined);
  return lines.join("\r\n");
}

// covered is the text under a diagnostic.
function covered(text, { range }) {
  assert.equal(range.start.line, range.end.line);
  return cut(text.split("\r\n")[range.start.line], range.start.character, range.end.character);
}

// shown is a text with its diagnostics, as the test compares them.
const shown = (text, diagnostics) => ({
  text: text.replaceAll("\r\n", "\n"),
  marks: diagnostics.map((d) => ({
    line: d.range.start.line,
    start: d.range.start.character,
    stop: d.range.end.character,
    covers: covered(text, d),
    message: d.message,
  })),
});

const capabilities = {
  general: { positionEncodings: [units] },
  textDocument: {
    diagnostic: {},
    codeAction: {
      dataSupport: true,
      isPreferredSupport: true,
      resolveSupport: { properties: ["edit"] },
      codeActionLiteralSupport: { codeActionKind: { valueSet: ["quickfix", "source.fixAll"] } },
    },
  },
  workspace: {
    configuration: true,
    didChangeWatchedFiles: { dynamicRegistration: true, relativePatternSupport: true },
    workspaceEdit: { documentChanges: true },
    diagnostics: { refreshSupport: true },
  },
};

const folders = [{ uri: pathToFileURL(".").href, name: "pilots" }];
const open = (uri, text) => ({ textDocument: { uri, languageId: "markdown", version: 1, text } });

async function main() {
  const { connection, end, ask } = start();
  const settings = {};
  let asked = [];
  connection.onRequest(lsp.ConfigurationRequest.type, ({ items }) => {
    asked.push(...items);
    return items.map(() => settings);
  });
  const watched = [];
  connection.onRequest(lsp.RegistrationRequest.type, ({ registrations }) => {
    const files = registrations.filter((r) => r.method === lsp.DidChangeWatchedFilesNotification.method);
    watched.push(...files.flatMap((r) => r.registerOptions.watchers.map((w) => w.globPattern)));
  });
  let refreshed;
  const refreshing = () => within("a refresh", new Promise((done) => { refreshed = done; }));
  connection.onRequest(lsp.DiagnosticRefreshRequest.type, () => refreshed?.());
  connection.listen();

  const { capabilities: can } = await ask(lsp.InitializeRequest.type,
    { processId: process.pid, rootUri: folders[0].uri, workspaceFolders: folders, capabilities });
  assert.equal(can.positionEncoding, units);
  assert.equal(can.textDocumentSync.change, lsp.TextDocumentSyncKind.Incremental);
  assert.ok(can.diagnosticProvider && can.codeActionProvider.resolveProvider);
  await connection.sendNotification(lsp.InitializedNotification.type, {});

  // Diagnostics are pulled, and not sent again when nothing changed.
  let text = await readFile(name, "utf8");
  await connection.sendNotification(lsp.DidOpenTextDocumentNotification.type, open(uri, text));
  const pull = (previousResultId) => ask(lsp.DocumentDiagnosticRequest.type, { textDocument: { uri }, previousResultId });
  const first = await pull();
  assert.equal(first.kind, "full");
  assert.equal(first.items.length, Number(count), JSON.stringify(first));
  assert.deepEqual(await pull(first.resultId), { kind: "unchanged", resultId: first.resultId });
  const opened = shown(text, first.items);
  assert.deepEqual(asked.map((i) => i.section), asked.map(() => "foulcase"));
  assert.ok(asked.some((i) => i.scopeUri === uri), JSON.stringify(asked));

  // A correction comes without its edit, which is asked for.
  const diagnostic = first.items.find((d) => covered(text, d) === misspelt);
  const actions = await ask(lsp.CodeActionRequest.type, { textDocument: { uri }, range: diagnostic.range, context: { diagnostics: [diagnostic] } });
  const [action] = actions.filter((a) => a.kind === "quickfix");
  assert.ok(action.isPreferred && !action.edit, JSON.stringify(actions));
  assert.deepEqual(action.diagnostics, [diagnostic]);
  const { edit } = await ask(lsp.CodeActionResolveRequest.type, action);
  const [{ textDocument, edits: [change] }] = edit.documentChanges;
  assert.deepEqual(textDocument, { uri, version: 1 });
  text = edited(text, change);
  await connection.sendNotification(lsp.DidChangeTextDocumentNotification.type,
    { textDocument: { uri, version: 2 }, contentChanges: [{ range: change.range, text: change.newText }] });
  const second = await pull(first.resultId);
  assert.equal(second.kind, "full");
  const corrected = shown(text, second.items);

  // An edit that is asked for too late is refused.
  await assert.rejects(ask(lsp.CodeActionResolveRequest.type, action), { code: lsp.LSPErrorCodes.ContentModified });

  // Settings that change are asked for anew.
  asked = [];
  settings.house = [houseWord];
  const refresh = refreshing();
  await connection.sendNotification(lsp.DidChangeConfigurationNotification.type, { settings: null });
  await refresh;
  assert.ok(asked.some((i) => i.scopeUri === uri), JSON.stringify(asked));
  const third = await pull(second.resultId);
  assert.equal(third.kind, "full");
  const housed = shown(text, third.items);

  // A list of house words that another program writes to is read anew.
  assert.ok(watched.some((w) => w.pattern === "words.txt" && w.baseUri === folders[0].uri), JSON.stringify(watched));
  const { covers } = housed.marks[0];
  await appendFile("words.txt", `${covers}\n`);
  const again = refreshing();
  await connection.sendNotification(lsp.DidChangeWatchedFilesNotification.type,
    { changes: [{ uri: pathToFileURL("words.txt").href, type: lsp.FileChangeType.Changed }] });
  await again;
  const { items } = await pull();
  assert.deepEqual(items.map((d) => covered(text, d)), housed.marks.slice(1).map((m) => m.covers));

  await cancel(connection, text);

  await ask(lsp.ShutdownRequest.type);
  await assert.rejects(pull(), { code: lsp.ErrorCodes.InvalidRequest });
  await connection.sendNotification(lsp.ExitNotification.type);
  assert.equal(await within("the end of the server", end), 0);
  await leave();
  await writeFile(reportName, JSON.stringify({ opened, corrected, housed }));
}

// cancel asks for the diagnostics of a long document and loses interest. The request
// stays answerable for longer than it takes to cancel it.
async function cancel(connection, text) {
  const long = `${uri}.long.md`;
  await connection.sendNotification(lsp.DidOpenTextDocumentNotification.type, open(long, text.repeat(4000)));
  const token = new lsp.CancellationTokenSource();
  const answer = connection.sendRequest(lsp.DocumentDiagnosticRequest.type, { textDocument: { uri: long } }, token.token);
  token.cancel();
  await assert.rejects(within("an answer to what was cancelled", answer), { code: lsp.LSPErrorCodes.RequestCancelled });
  await connection.sendNotification(lsp.DidCloseTextDocumentNotification.type, { textDocument: { uri: long } });
}

// leave ends a session without asking for the end, first by a message, then without.
async function leave() {
  for (const exit of [
    ({ connection }) => connection.sendNotification(lsp.ExitNotification.type),
    ({ server }) => server.stdin.end(),
  ]) {
    const session = start();
    session.connection.listen();
    await session.ask(lsp.InitializeRequest.type, { processId: null, rootUri: null, capabilities: {} });
    await exit(session);
    assert.equal(await within("the end of an abandoned server", session.end), 1);
  }
}

try {
  await main();
  process.exit(0);
} catch (problem) {
  console.error(problem, `\n${frames.map((f) => f.slice(0, 2000)).join("\n")}`);
  process.exit(1);
}
