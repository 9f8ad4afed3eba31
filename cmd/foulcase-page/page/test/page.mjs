// Tests the built page in a browser: `node page.mjs DIST [SCREENSHOTS]`.

import assert from "node:assert/strict";
import { join } from "node:path";
import { isReady, launch, openPage } from "./browser.mjs";
import { serve } from "./serve.mjs";

const [dist, screenshots] = process.argv.slice(2);
const site = await serve(dist);
const browser = await launch();
const troubles = [];
const timeout = 30_000; // ms

// modelFetches counts how often the model was asked for.
const modelFetches = () => Object.entries(site.asked).reduce((n, [name, times]) => (name.endsWith(".fcm") ? n + times : n), 0);

// lastLine is the last line of the text, as the editor shows it.
const lastLine = (page) => page.locator(".cm-line").last();

// underlined waits for a word of the last line to be underlined, or for none to be.
const underlined = (page, word) =>
  page.waitForFunction(
    (word) => {
      const lines = document.getElementById("text").shadowRoot.querySelectorAll(".cm-line");
      const marks = [...lines[lines.length - 1].querySelectorAll(".mark, .query")];
      return marks.map((m) => m.textContent).join() === word;
    },
    word,
    { timeout },
  );

// modelKept waits until the browser has put the model away.
const modelKept = (page) =>
  page.waitForFunction(async () => (await (await caches.open("foulcase-model")).keys()).length === 1, null, { timeout, polling: 100 });

async function step(name, run) {
  await run();
  assert.deepEqual(troubles, [], name);
  console.log(`ok ${name}`);
}

async function picture(page, name) {
  if (screenshots) await page.screenshot({ path: join(screenshots, `${name}.png`) });
}

try {
  const page = await openPage(browser, site.url, troubles, { colorScheme: "light" });

  await step("the first text is judged", async () => {
    assert.match(await isReady(page), /^Ready: [1-9]\d* marks?, \d+ quer/);
    assert.equal(modelFetches(), 1);
    const listed = await page.locator("#marks .show").count();
    const inText = await page.locator(".cm-content .mark, .cm-content .query").count();
    assert.equal(inText, listed, "as many are underlined as are listed");
  });

  await step("a slip after an emoji is underlined in its place", async () => {
    await page.click(".cm-content");
    await page.keyboard.press("Control+End");
    await page.keyboard.type("🌊 The tide turned befour the boat came.");
    await underlined(page, "befour");
    const before = await lastLine(page).evaluate((line) => {
      const range = document.createRange();
      range.setStart(line, 0);
      range.setEndBefore(line.querySelector(".mark, .query"));
      return range.toString();
    });
    assert.equal(before, "🌊 The tide turned ");
  });

  await step("a click opens its card, whose first choice corrects it", async () => {
    await lastLine(page).locator(".mark, .query").click();
    await page.locator(".card", { hasText: "befour" }).waitFor();
    await page.locator(".card .preferred").waitFor();
    await picture(page, "card-light");
    await page.locator(".card .preferred").click();
    await underlined(page, "");
    assert.equal(await lastLine(page).textContent(), "🌊 The tide turned before the boat came.");
    await page.locator(".card").waitFor({ state: "detached" });
  });

  await step("the keys reach a mark, its card and the correction", async () => {
    const listed = await page.locator("#marks .show").count();
    await page.keyboard.press("Control+Home");
    await page.keyboard.press("F8");
    await page.locator(".card", { hasText: "befor" }).waitFor();
    await page.keyboard.press("Control+.");
    await page.locator(".card .preferred:focus").waitFor();
    await page.keyboard.press("Enter");
    await page.waitForFunction((n) => document.querySelectorAll("#marks .show").length === n, listed - 1, { timeout });
    assert.match(await page.locator(".cm-line").nth(3).textContent(), /channel 12 before the boat/);
  });

  await step("the pointer opens a card too, and Let it stand makes a house word", async () => {
    await page.keyboard.press("Control+End");
    await page.keyboard.type(" Call the skipperr.");
    await underlined(page, "skipperr");
    await lastLine(page).locator(".mark, .query").hover();
    await page.locator(".card button", { hasText: "stand" }).click();
    await underlined(page, "");
    await page.locator("#house li", { hasText: "skipperr" }).waitFor();
    await page.click('#house button[aria-label="Forget skipperr"]');
    await underlined(page, "skipperr");
  });

  await step("the list corrects one, and all", async () => {
    await page.locator("#marks .take").first().click();
    await page.locator("#marks .take").first().waitFor();
    await page.click("#take-all");
    await page.waitForFunction(() => document.getElementById("take-all").hidden, null, { timeout });
  });

  await step("a reload takes the model from the browser's store", async () => {
    await modelKept(page);
    await page.reload();
    await isReady(page);
    assert.equal(modelFetches(), 1);
  });

  await step("a damaged copy is dropped and the model fetched again", async () => {
    await page.evaluate(async () => {
      const cache = await caches.open("foulcase-model");
      const [key] = await cache.keys();
      const bytes = new Uint8Array(await (await cache.match(key)).arrayBuffer());
      bytes[bytes.length >> 1] ^= 1;
      await cache.put(key, new Response(bytes));
    });
    await page.reload();
    await isReady(page);
    await modelKept(page);
    assert.equal(modelFetches(), 2);
  });

  await step("a model that arrives damaged is refused", async () => {
    site.damage = (name, bytes) => (name.endsWith(".fcm") ? bytes.fill(0, 1000, 1001) : bytes);
    const other = await openPage(browser, site.url, troubles);
    await other.waitForSelector('#state[data-state="ended"]', { timeout });
    assert.match(await other.textContent("#state"), /arrived damaged/);
    site.damage = (name, bytes) => bytes;
    await other.context().close();
  });

  await step("the page works without its server", async () => {
    await modelKept(page);
    await page.evaluate(() => navigator.serviceWorker.ready);
    await site.close();
    await page.reload();
    await isReady(page);
    await page.emulateMedia({ colorScheme: "dark" });
    await page.click("#marks .show >> nth=2");
    await page.locator(".card .preferred").waitFor();
    await picture(page, "card-dark");
    await page.setViewportSize({ width: 420, height: 900 });
    await picture(page, "narrow-dark");
  });
} finally {
  await browser.close();
  await site.close();
}
