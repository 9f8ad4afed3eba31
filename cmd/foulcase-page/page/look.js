// How the editor looks. Colours are properties of the page, see style.css.

import { EditorView } from "@codemirror/view";

export const look = EditorView.theme({
  "&": { color: "var(--ink)", backgroundColor: "var(--sheet)", height: "100%" },
  "&.cm-focused": { outline: "none" },
  ".cm-scroller": { fontFamily: "var(--text-font)", lineHeight: "1.65", fontSize: "1.06rem" },
  ".cm-content": { padding: "1.4rem 0 4rem", caretColor: "var(--ink)" },
  ".cm-line": { padding: "0 1.8rem" },
  ".cm-cursor": { borderLeftColor: "var(--ink)", borderLeftWidth: "2px" },
  ".cm-selectionBackground, &.cm-focused > .cm-scroller > .cm-selectionLayer .cm-selectionBackground": {
    backgroundColor: "var(--selection)",
  },
  ".cm-lintRange": { backgroundImage: "none", paddingBottom: "0" },
  ".cm-lintPoint:after": { display: "none" },
  ".mark": {
    textDecoration: "underline solid var(--mark) 2.5px",
    textUnderlineOffset: "4px",
    textDecorationSkipInk: "none",
    backgroundColor: "var(--mark-tint)",
  },
  ".query": {
    textDecoration: "underline dotted var(--query) 3px",
    textUnderlineOffset: "4px",
    textDecorationSkipInk: "none",
  },
  ".cm-tooltip": { border: "none", backgroundColor: "transparent" },
  ".card": {
    margin: "6px 0",
    maxWidth: "min(24rem, calc(100vw - 2rem))",
    padding: ".7rem .8rem",
    color: "var(--ink)",
    backgroundColor: "var(--raised)",
    borderRadius: "6px",
    borderLeft: "5px solid var(--mark)",
    boxShadow: "0 2px 14px #0006",
    font: ".92rem/1.4 var(--ui-font)",
  },
  ".query-card": { borderLeftColor: "var(--query)", borderLeftStyle: "dotted" },
  ".card p": { margin: "0 0 .5rem" },
  ".card .p": { whiteSpace: "nowrap", color: "var(--faint)" },
  ".choices": { display: "grid", gap: ".3rem", minWidth: "14rem", maxHeight: "12.4rem", overflow: "auto", padding: "2px" },
  ".card button": {
    font: "inherit",
    textAlign: "left",
    padding: ".35rem .6rem",
    color: "var(--ink)",
    backgroundColor: "transparent",
    border: "1px solid var(--line)",
    borderRadius: "4px",
    cursor: "pointer",
  },
  ".card .preferred": { color: "var(--on-accent)", backgroundColor: "var(--accent)", borderColor: "var(--accent)" },
  ".card .stand": { marginTop: ".4rem", marginLeft: "2px", color: "var(--faint)", border: "none", textDecoration: "underline" },
  ".card button:hover": { borderColor: "var(--ink)" },
  ".card button:focus-visible": { outline: "2px solid var(--focus)", outlineOffset: "1px" },
});
