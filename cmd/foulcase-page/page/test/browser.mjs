// A browser for tests of the page.

import { chromium } from "playwright-core";

// launch starts the Chromium that CHROMIUM names, without a window.
export const launch = () =>
  chromium.launch({
    executablePath: process.env.CHROMIUM || "/usr/bin/chromium",
    args: ["--no-sandbox", "--disable-background-networking", "--disable-component-update", "--no-first-run"],
  });

// openPage opens the page in a profile of its own. Whatever goes wrong in it, and every
// request to another place than url, is added to troubles.
export async function openPage(browser, url, troubles, options = {}) {
  const context = await browser.newContext({ viewport: { width: 1200, height: 860 }, ...options });
  context.on("request", (request) => {
    if (!request.url().startsWith(url)) troubles.push(`a request to ${request.url()}`);
  });
  const page = await context.newPage();
  page.on("pageerror", (err) => troubles.push(`error in the page: ${err.stack}`));
  page.on("console", (message) => {
    if (message.type() === "error") troubles.push(`the page says: ${message.text()}`);
  });
  await page.goto(url);
  return page;
}

// isReady waits until the text is judged, and gives what the state line says.
export async function isReady(page) {
  await page.waitForSelector('#state[data-state="ready"], #state[data-state="ended"]', { timeout: 60_000 });
  const state = await page.textContent("#state");
  if (!state.startsWith("Ready")) throw new Error(`the page says ${state}`);
  return state;
}
