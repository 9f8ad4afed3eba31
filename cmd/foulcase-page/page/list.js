// What stands beside the text: the list of marks, and the house words.

import { show } from "./card.js";
import { element } from "./element.js";
import { certainty, marksOf, still, take, takeAll } from "./marks.js";

const byId = (id) => document.getElementById(id);

// mostListed is how many marks are listed: more help nobody.
const mostListed = 200;

// listMarks shows the marks of a view beside its text.
export function listMarks(view) {
  const all = marksOf(view.state);
  const sure = all.filter((m) => m.grade === "mark");
  const list = byId("marks");
  const focus = focusIn(list);
  list.replaceChildren(...all.slice(0, mostListed).map((m) => item(view, m)));
  if (all.length > mostListed) list.append(element("li", { class: "more" }, `and ${all.length - mostListed} more`));
  restoreFocus(list, focus, view);
  byId("none").hidden = all.length > 0;
  byId("take-all").hidden = sure.length === 0;
  byId("take-all").textContent = `Correct all ${sure.length} marks`;
  byId("take-all").onclick = () => takeAll(view);
  return { marks: sure.length, queries: all.length - sure.length };
}

function item(view, mark) {
  const [best] = mark.corrections;
  const go = element("button", { type: "button", class: "show" }, [
    element("span", { class: mark.grade }, mark.observed),
    ...(best ? [" → ", element("ins", {}, best)] : []),
    element("small", {}, `${mark.grade}, ${certainty(mark)}: ${mark.kind}`),
  ]);
  const act = (what) => () => {
    const now = still(view.state, mark);
    if (now) what(view, now);
  };
  go.onclick = act(show);
  if (!best) return element("li", {}, go);
  const accept = element("button", { type: "button", class: "take", "aria-label": `Correct ${mark.observed} to ${best}` }, "Correct");
  accept.onclick = act(take);
  return element("li", {}, [go, accept]);
}

// focusIn tells which button of a list has the focus: its place and its class.
function focusIn(list) {
  const button = document.activeElement?.closest("button");
  return list.contains(button) ? { place: [...list.children].indexOf(button.parentNode), name: button.className } : null;
}

// restoreFocus gives the focus to the button at the place of one that went away.
function restoreFocus(list, focus, view) {
  if (!focus) return;
  const items = list.children;
  const next = items[Math.min(focus.place, items.length - 1)]?.querySelector(`.${focus.name}`);
  if (next) next.focus();
  else view.focus();
}

// listHouse shows the house words; drop is called with one to be forgotten.
export function listHouse(words, drop) {
  byId("house").replaceChildren(...words.map((word) => {
    const button = element("button", { type: "button", "aria-label": `Forget ${word}` }, "×");
    button.onclick = () => drop(word);
    return element("li", {}, [word, button]);
  }));
}
