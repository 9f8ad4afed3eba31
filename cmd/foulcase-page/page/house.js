// The house words, which the browser remembers where it may.

import { houseWords } from "./papers.js";

const key = "foulcase.house";

let words = remembered() ?? houseWords;

function remembered() {
  try {
    const list = JSON.parse(localStorage.getItem(key));
    return Array.isArray(list) ? list.filter((word) => typeof word === "string") : null;
  } catch {
    return null;
  }
}

// house lists the house words.
export const house = () => words;

// setHouse puts others in their place.
export function setHouse(list) {
  words = [...new Set(list)].sort((a, b) => a.localeCompare(b));
  try {
    localStorage.setItem(key, JSON.stringify(words));
  } catch (err) {
    console.warn("the house words are not remembered:", err);
  }
}
