// The model: fetched once, then kept by the browser under its hash.

const kept = "foulcase-model";

// loadModel returns the bytes of the model that model.json names. Progress is told
// what share of it is here, from 0 to 1.
export async function loadModel(progress) {
  const wanted = await (await get("model.json")).json();
  const cache = await openCache();
  const copy = await cache?.match(wanted.file);
  if (copy) {
    const bytes = await copy.arrayBuffer();
    if (await isSound(bytes, wanted)) return bytes;
    await cache.delete(wanted.file);
  }
  const bytes = await fetchModel(wanted, progress);
  if (!(await isSound(bytes, wanted))) {
    throw new Error(`the model arrived damaged (${bytes.byteLength} of ${wanted.bytes} bytes)`);
  }
  if (cache) keep(cache, wanted, new Response(bytes)); // which has a copy; nobody waits for it
  return bytes;
}

async function get(file) {
  const response = await fetch(file);
  if (!response.ok) throw new Error(`${file}: the server says ${response.status} ${response.statusText}`);
  return response;
}

// openCache returns the browser's store; null where a page may not keep anything:
// over plain http, or in some private windows.
async function openCache() {
  try {
    return await caches.open(kept);
  } catch {
    return null;
  }
}

// keep stores a model in place of all others. A full disk is no reason to stop.
async function keep(cache, wanted, response) {
  try {
    for (const other of await cache.keys()) await cache.delete(other);
    await cache.put(wanted.file, response);
  } catch (err) {
    console.warn("the model is not kept:", err);
  }
}

async function fetchModel(wanted, progress) {
  const response = await get(wanted.file);
  const bytes = new Uint8Array(wanted.bytes);
  let size = 0;
  for (const reader = response.body.getReader(); ; ) {
    const { done, value } = await reader.read();
    if (done) return size === bytes.length ? bytes.buffer : bytes.buffer.slice(0, size);
    if (size + value.length > bytes.length) throw new Error("the model is longer than model.json says");
    bytes.set(value, size);
    size += value.length;
    progress(size / bytes.length);
  }
}

// isSound compares with the hash, where the browser lets a page compute one. The
// server checks the model's own sums in any case.
async function isSound(bytes, wanted) {
  if (bytes.byteLength !== wanted.bytes) return false;
  if (!crypto.subtle) return true;
  const sum = new Uint8Array(await crypto.subtle.digest("SHA-256", bytes));
  return Array.from(sum, (b) => b.toString(16).padStart(2, "0")).join("") === wanted.sha256;
}
