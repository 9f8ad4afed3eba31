// Measures the built page: `node measure.mjs DIST [RUNS]` prints medians.

import { brotliCompressSync, constants, gzipSync } from "node:zlib";
import { readFile } from "node:fs/promises";
import { join } from "node:path";
import { isReady, launch, openPage } from "./browser.mjs";
import { serve } from "./serve.mjs";

const dist = process.argv[2];
const runs = Number(process.argv[3] ?? 5);
const median = (numbers) => numbers.toSorted((a, b) => a - b)[numbers.length >> 1];
const say = (what, numbers, unit) =>
  console.log(`${what}: ${median(numbers).toFixed(0)} ${unit} (${numbers.map((n) => n.toFixed(0)).join(" ")})`);

const { file } = JSON.parse(await readFile(join(dist, "model.json"), "utf8"));
for (const name of ["foulcase.wasm", "page.js", file]) {
  const bytes = await readFile(join(dist, name));
  const quality = { params: { [constants.BROTLI_PARAM_QUALITY]: 9 } };
  console.log(`${name}: ${bytes.length} bytes, gzip ${gzipSync(bytes).length}, brotli ${brotliCompressSync(bytes, quality).length}`);
}

// sinceStart is the time from the begin of loading the page to its first marks.
const sinceStart = async (page) => {
  await isReady(page);
  return page.evaluate(() => performance.now());
};

// toUnderline types a letter that makes a word of the last line a slip, and takes the
// time from the key to the frame that shows the line under it; then takes it back.
async function toUnderline(page) {
  await page.keyboard.press("Control+End");
  await page.keyboard.type("Before the bo");
  await page.waitForTimeout(1000); // for the page to be at rest, nothing waits for it
  const took = page.evaluate(
    () =>
      new Promise((resolve) => {
        const root = document.getElementById("text").shadowRoot;
        let start;
        document.addEventListener("keydown", () => (start = performance.now()), { capture: true, once: true });
        const look = () => {
          const marks = root.querySelectorAll(".cm-line:last-child .mark, .cm-line:last-child .query");
          if (start && marks.length > 0) resolve(performance.now() - start);
          else requestAnimationFrame(look);
        };
        look();
      }),
  );
  await page.keyboard.type("q");
  const ms = await took;
  for (let i = 0; i < "Before the boq".length; i++) await page.keyboard.press("Backspace");
  return ms;
}

const site = await serve(dist);
const browser = await launch();
const troubles = [];
const cold = [];
const kept = [];
const keys = [];
for (let i = 0; i < runs; i++) {
  const page = await openPage(browser, site.url, troubles);
  cold.push(await sinceStart(page));
  await page.evaluate(() => navigator.serviceWorker.ready);
  await page.reload();
  kept.push(await sinceStart(page));
  await page.click(".cm-content");
  keys.push(await toUnderline(page));
  await page.context().close();
}
say("ready, first load", cold, "ms");
say("ready, model kept", kept, "ms");
say("key to underline", keys, "ms");
troubles.forEach((trouble) => console.log(trouble));
await browser.close();
await site.close();
