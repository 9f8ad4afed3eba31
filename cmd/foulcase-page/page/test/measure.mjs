// Measures the built page: `node measure.mjs DIST [RUNS]` prints medians.

import { brotliCompressSync, constants, gzipSync } from "node:zlib";
import { readFile } from "node:fs/promises";
import { join } from "node:path";
import { launch, openPage } from "./browser.mjs";
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
  const ready = () => document.getElementById("state")?.dataset.state === "ready" && performance.now();
  return (await page.waitForFunction(ready, null, { polling: "raf", timeout: 60_000 })).jsonValue();
};

// toUnderline types a letter that makes a word of the last line a slip, and takes the
// time from the key to the frame that shows the line under it; then takes it back.
async function toUnderline(page) {
  await page.keyboard.press("Control+End");
  await page.keyboard.type("They waited until");
  await page.waitForTimeout(1000); // for the page to be at rest; a wrong guess only blurs the measure
  await page.evaluate(() => {
    const root = document.getElementById("text").shadowRoot;
    let start;
    document.addEventListener("keydown", () => (start = performance.now()), { capture: true, once: true });
    window.underlined = new Promise((resolve) => {
      const look = () => {
        if (start && root.querySelector(".cm-line:last-child .mark")) resolve(performance.now() - start);
        else requestAnimationFrame(look);
      };
      look();
    });
  });
  await page.keyboard.type("l");
  const ms = await page.evaluate(() => window.underlined);
  for (let i = 0; i < "They waited untill".length; i++) await page.keyboard.press("Backspace");
  return ms;
}

// rendererMemory is what the page's process has in memory, in MiB, the files that it shares
// with other processes left out, as Linux tells it.
async function rendererMemory(browser) {
  const cdp = await browser.newBrowserCDPSession();
  const { processInfo } = await cdp.send("SystemInfo.getProcessInfo");
  const pids = processInfo.filter(({ type }) => type === "renderer").map(({ id }) => id);
  const all = await Promise.all(pids.map((pid) => readFile(`/proc/${pid}/status`, "utf8")));
  return Math.max(...all.map((status) => Number(status.match(/RssAnon:\s*(\d+) kB/)[1]) / 1024));
}

const site = await serve(dist);
const browser = await launch();
const troubles = [];
const cold = [];
const kept = [];
const keys = [];
const memory = [];
for (let i = 0; i < runs; i++) {
  const page = await openPage(browser, site.url, troubles);
  cold.push(await sinceStart(page));
  await page.evaluate(() => navigator.serviceWorker.ready);
  await page.reload();
  kept.push(await sinceStart(page));
  await page.click(".cm-content");
  keys.push(await toUnderline(page));
  memory.push(await rendererMemory(browser));
  await page.context().close();
}
say("ready, first load", cold, "ms");
say("ready, model kept", kept, "ms");
say("key to underline", keys, "ms");
say("memory of the page's process", memory, "MiB");
troubles.forEach((trouble) => console.log(trouble));
await browser.close();
await site.close();
