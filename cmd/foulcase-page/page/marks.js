// The marks of the language server, as diagnostics of the editor.

import { forEachDiagnostic, linter, setDiagnostics } from "@codemirror/lint";
import { LSPPlugin } from "@codemirror/lsp-client";

const warning = 2; // LSP 3.17, DiagnosticSeverity: marks are warnings, queries less

const kinds = {
  nonword: "not a word known here",
  realword: "hardly the word meant",
  runon: "a space too few",
  split: "a space too many",
  repeat: "written twice",
};

// marksOf lists the marks as they stand in the text, in order:
// {from, to, observed, grade, kind, p, corrections, raw}, where raw is the server's
// own diagnostic.
export function marksOf(state) {
  const all = [];
  forEachDiagnostic(state, ({ raw }, from, to) => {
    all.push({
      from,
      to,
      observed: state.sliceDoc(from, to),
      grade: raw.severity <= warning ? "mark" : "query",
      kind: kinds[raw.code],
      p: raw.data.p,
      corrections: raw.data.corrections,
      raw,
    });
  });
  return all;
}

// markAt is the mark that holds a position, or ends there.
export const markAt = (state, pos) => marksOf(state).find((m) => m.from <= pos && pos <= m.to);

// still finds a mark again in a text that may have changed; undefined when it is gone.
export const still = (state, mark) => marksOf(state).find((m) => m.raw === mark.raw);

// certainty says a mark's p in words.
export const certainty = (mark) => `p ${Math.min(mark.p, 0.99).toFixed(2)}`;

// judge asks the server for the marks of the text as it stands; the result is false when
// that has changed before they came. The client announces that it pulls diagnostics, so
// it has to.
export async function judge(view) {
  const plugin = LSPPlugin.get(view);
  plugin.client.sync();
  const doc = view.state.doc;
  let report;
  while (!report && view.state.doc === doc) {
    try {
      report = await plugin.client.request("textDocument/diagnostic", { textDocument: { uri: plugin.uri } });
    } catch (refusal) {
      if (!refusal.data?.retriggerRequest) throw refusal;
    }
  }
  if (view.state.doc !== doc) return false;
  view.dispatch(setDiagnostics(view.state, report.items.map((raw) => diagnostic(plugin, raw))));
  return true;
}

function diagnostic(plugin, raw) {
  const sure = raw.severity <= warning;
  return {
    from: plugin.fromPosition(raw.range.start),
    to: plugin.fromPosition(raw.range.end),
    severity: sure ? "warning" : "info",
    markClass: sure ? "mark" : "query",
    message: raw.message,
    raw,
  };
}

// The editor's own cards of diagnostics are left out: card.js has ours.
export const underlining = linter(null, { tooltipFilter: () => [] });

// actionsOn asks the server what can be done about a stretch of the text: code actions,
// only those of a kind when that is given.
export async function actionsOn(view, from, to, { only, diagnostics = [] } = {}) {
  const plugin = LSPPlugin.get(view);
  plugin.client.sync();
  const doc = view.state.doc;
  const actions = await plugin.client.request("textDocument/codeAction", {
    textDocument: { uri: plugin.uri },
    range: { start: plugin.toPosition(from), end: plugin.toPosition(to) },
    context: { diagnostics, only },
  });
  return actions.map((action) => ({ ...action, apply: () => apply(view, plugin, action, doc) }));
}

// apply makes the edit of a code action, unless the text is another by now.
function apply(view, plugin, action, doc) {
  if (view.state.doc !== doc) return;
  const changes = action.edit.changes[plugin.uri].map(({ range, newText }) => ({
    from: plugin.fromPosition(range.start),
    to: plugin.fromPosition(range.end),
    insert: newText,
  }));
  view.dispatch({ changes, userEvent: "input.correct", scrollIntoView: changes.length === 1 });
}

// take makes the server's preferred correction of a mark.
export async function take(view, mark) {
  const actions = await actionsOn(view, mark.from, mark.to, { only: ["quickfix"], diagnostics: [mark.raw] });
  actions.find((a) => a.isPreferred)?.apply();
}

// takeAll corrects every mark that the server is sure of; queries are left alone.
export async function takeAll(view) {
  const actions = await actionsOn(view, 0, view.state.doc.length, { only: ["source.fixAll"] });
  actions[0]?.apply();
}
