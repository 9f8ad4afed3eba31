// The card of a mark: what it is and what can be done about it. It opens under the
// pointer, and at the cursor by a click or the keys; only one is open at a time.

import { EditorSelection, Prec, StateEffect, StateField } from "@codemirror/state";
import { EditorView, hoverTooltip, keymap, showTooltip } from "@codemirror/view";
import { element } from "./element.js";
import { actionsOn, certainty, markAt, marksOf } from "./marks.js";

// open opens the card of a mark, or closes it when that is null. The first button of a
// card whose mark says takesFocus has the focus.
const open = StateEffect.define();

// opened is the mark whose card is open at the cursor.
const opened = StateField.define({
  create: () => null,
  update(mark, tr) {
    if (tr.docChanged || tr.selection) mark = null;
    for (const effect of tr.effects) if (effect.is(open)) mark = effect.value;
    return mark;
  },
  provide: (field) => showTooltip.from(field, (mark) => mark && tooltip(mark)),
});

// cards is the extension. LetStand is called with a view and a mark that the reader
// lets stand.
export function cards(letStand) {
  return [
    letStanding.init(() => letStand),
    opened,
    hoverTooltip((view, pos) => {
      const mark = markAt(view.state, pos);
      return mark && mark.from !== view.state.field(opened)?.from ? tooltip(mark) : null;
    }, { hideOnChange: true }),
    EditorView.domEventHandlers({
      click(event, view) {
        const pos = view.posAtCoords({ x: event.clientX, y: event.clientY });
        const mark = pos !== null && view.state.selection.main.empty && markAt(view.state, pos);
        if (mark) view.dispatch({ effects: open.of(mark) });
      },
    }),
    Prec.high(keymap.of([
      { key: "F8", run: (view) => step(view, 1), shift: (view) => step(view, -1) },
      { key: "Mod-.", run: enter },
      { key: "Escape", run: close },
    ])),
  ];
}

// letStanding remembers what cards was given.
const letStanding = StateField.define({ create: () => () => {}, update: (value) => value });

// show moves the cursor to a mark and opens its card.
export function show(view, mark) {
  view.focus();
  view.dispatch({
    selection: EditorSelection.cursor(mark.from),
    effects: [EditorView.scrollIntoView(mark.from, { y: "center" }), open.of(mark)],
  });
}

// step shows the next mark after the cursor, or the one before it, round the end.
function step(view, by) {
  const all = marksOf(view.state);
  if (all.length === 0) return false;
  const here = view.state.selection.main.head;
  const next = by > 0 ? all.find((m) => m.from > here) ?? all[0] : all.findLast((m) => m.from < here) ?? all.at(-1);
  show(view, next);
  return true;
}

// enter moves the focus into the card of the mark at the cursor.
function enter(view) {
  const mark = view.state.field(opened) ?? markAt(view.state, view.state.selection.main.head);
  if (!mark) return false;
  view.dispatch({ effects: open.of({ ...mark, takesFocus: true }) });
  return true;
}

function close(view) {
  if (!view.state.field(opened)) return false;
  view.dispatch({ effects: open.of(null) });
  view.focus();
  return true;
}

const tooltip = (mark) => ({
  pos: mark.from,
  end: mark.to,
  create: (view) => ({ dom: card(view, mark) }),
});

function card(view, mark) {
  const choices = element("div", { class: "choices" });
  const parts = [
    element("p", {}, [element("b", {}, mark.grade), ` "${mark.observed}": ${mark.kind} `, element("span", { class: "p" }, certainty(mark))]),
    choices,
  ];
  if (!/\s/.test(mark.observed)) parts.push(standing(view, mark));
  const dom = element("div", { class: `card ${mark.grade}-card`, role: "dialog", "aria-label": `${mark.grade}: ${mark.observed}` }, parts);
  dom.addEventListener("keydown", (event) => {
    if (event.key === "Escape") close(view);
  });
  fill(view, mark, choices)
    .then(() => mark.takesFocus && dom.querySelector("button").focus())
    .catch((err) => choices.append(err.message));
  return dom;
}

// fill puts a button into the card for each correction.
async function fill(view, mark, choices) {
  const actions = await actionsOn(view, mark.from, mark.to, { only: ["quickfix"], diagnostics: [mark.raw] });
  for (const { title, isPreferred, apply } of actions) {
    choices.append(button(view, title, isPreferred ? "preferred" : "", apply));
  }
  view.requestMeasure();
}

function standing(view, mark) {
  return button(view, `Let "${mark.observed}" stand`, "stand", () => {
    close(view);
    view.state.field(letStanding)(mark.observed);
  });
}

// button is one that acts and gives the focus back to the text.
function button(view, label, name, act) {
  const b = element("button", { type: "button", class: name }, label);
  b.onclick = () => {
    act();
    view.focus();
  };
  return b;
}
