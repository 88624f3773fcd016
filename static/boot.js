// Starts the app: loads the wasm, takes the start-up shell away, and looks after the offline copy.
//
// What the app finds on <html>:
//   data-js, data-wasm  full addresses of the glue script and the wasm, for starting a worker on the same files:
//                       new Worker("worker.js?js=<data-js>&wasm=<data-wasm>", { type: "module" })
//   data-worker         "yes" | "no"   whether this browser has module workers
//   data-fetching       "yes"   nothing can be drawn before the rest of the app has come
//   data-whole          "yes"   the whole app is there, not only its first screen
//   data-offline        "ready" | "failed" | "unsupported"   absent while the offline copy is still being made
//   data-update         "ready"   a newer version waits | "reload"   it took over from another tab
// Events on window:
//   lowside-offline-ready   the first offline copy is complete (once in the life of an installation)
//   lowside-offline-failed  detail: why there is no offline copy
//   lowside-update-ready    data-update has been set
// In the browser's timeline: the mark "drawn", when the first screen is there.
// Event the app sends to window:
//   lowside-apply-update    let the waiting version take over, then reload this page. Never done unasked.

const root = document.documentElement;
const script = document.querySelector("script[data-js]");
const glueUrl = new URL(script.dataset.js, document.baseURI).href;
const wasmUrl = new URL(script.dataset.wasm, document.baseURI).href;
const STALLED_AFTER_MS = 20_000;
const DRAWN_WITHIN_MS = 15_000;
const WHOLE_WITHIN_MS = 60_000;
const UPDATE_CHECK_EVERY_MS = 3_600_000;

root.dataset.js = glueUrl;
root.dataset.wasm = wasmUrl;
root.dataset.worker = moduleWorkers() ? "yes" : "no";

/** Whether module workers exist: a browser that has them reads the `type` option. */
function moduleWorkers() {
  let asked = false;
  const options = { get type() { asked = true; return "module"; } };
  try {
    // No valid address: the constructor reads its options, then throws before anything is fetched.
    new Worker("http://[", options);
  } catch {
    // What counts is whether the option was read.
  }
  return asked;
}

function say(text) {
  const status = document.getElementById("shell-status");
  if (status) status.textContent = text;
}

/** Passes the download through while telling how far it is. Decoded size: the total is not known beforehand. */
function counted(response, onBytes) {
  if (!response.body || typeof TransformStream !== "function") return response;
  let bytes = 0;
  const counter = new TransformStream({
    transform(chunk, controller) {
      bytes += chunk.byteLength;
      onBytes(bytes);
      controller.enqueue(chunk);
    },
  });
  return new Response(response.body.pipeThrough(counter), { headers: { "Content-Type": "application/wasm" } });
}

async function fetchWasm(onBytes) {
  const response = await fetch(wasmUrl, { credentials: "same-origin" });
  if (!response.ok) throw new Error(`the server answered ${response.status} for ${wasmUrl}`);
  // From the offline copy there is nothing to wait for, and the untouched response keeps the browser's code cache.
  return navigator.serviceWorker?.controller ? response : counted(response, onBytes);
}

/** Resolves when the app has put something into its root. */
function drawn() {
  const app = document.getElementById("app");
  if (app.firstElementChild) return Promise.resolve();
  return new Promise((resolve, reject) => {
    const watcher = new MutationObserver(() => {
      if (!app.firstElementChild) return;
      watcher.disconnect();
      resolve();
    });
    watcher.observe(app, { childList: true });
    const late = () => {
      // A slow download is no failure: how that ends is told by whoever fetches.
      if (root.dataset.fetching) setTimeout(late, DRAWN_WITHIN_MS);
      else reject(new Error("the app was loaded but drew no screen"));
    };
    setTimeout(late, DRAWN_WITHIN_MS);
  });
}

/** Why a start failed, in words, with what to do where that is known. */
function inWords(error) {
  const what = error?.message ?? String(error);
  if (!navigator.onLine) return `There is no network, and the app is not stored on this device yet. (${what})`;
  if (error instanceof TypeError) return `A file of the app could not be fetched: check the connection. (${what})`;
  return what;
}

async function start() {
  let lastSign = Date.now();
  const stalled = setInterval(() => {
    if (Date.now() - lastSign > STALLED_AFTER_MS) say("The connection is very slow or gone. Still waiting…");
  }, 1000);
  try {
    const [glue, wasm] = await Promise.all([
      import(glueUrl),
      fetchWasm((bytes) => {
        lastSign = Date.now();
        say(`Loading… ${Math.round(bytes / 1024)} kB`);
      }),
    ]);
    await glue.default({ module_or_path: wasm });
  } finally {
    clearInterval(stalled);
  }
  await drawn();
  performance.mark("drawn");
  document.getElementById("shell")?.remove();
  window.lowsideStarted = true;
}

function tell(name, detail) {
  window.dispatchEvent(new CustomEvent(name, { detail }));
}

function updateIs(state) {
  root.dataset.update = state;
  tell("lowside-update-ready", state);
}

const followed = new WeakSet();

/** Follows one installing version to its end. */
function follow(worker, isFirst) {
  if (!worker || followed.has(worker)) return;
  followed.add(worker);
  worker.addEventListener("statechange", () => {
    if (worker.state === "installed" && !isFirst) updateIs("ready");
    if (worker.state === "activated" && isFirst) {
      root.dataset.offline = "ready";
      tell("lowside-offline-ready");
    }
    if (worker.state === "redundant" && isFirst && root.dataset.offline !== "ready") {
      noOfflineCopy("failed", "The files for offline use could not all be downloaded. It is tried again at the next start.");
    }
  });
}

function noOfflineCopy(state, why) {
  root.dataset.offline = state;
  tell("lowside-offline-failed", why);
}

async function keepOfflineCopy() {
  const container = navigator.serviceWorker;
  if (!container) {
    noOfflineCopy("unsupported", "This browser keeps no offline copy here (a private window, or an address without https).");
    return;
  }
  let asked = false;
  let controlled = container.controller !== null;
  container.addEventListener("controllerchange", () => {
    if (asked) window.location.reload();
    else if (controlled) updateIs("reload");
    controlled = true;
  });
  try {
    const registration = await container.register("sw.js", { updateViaCache: "none" });
    if (registration.active) root.dataset.offline = "ready";
    if (registration.waiting) updateIs("ready");
    follow(registration.installing, !registration.active);
    registration.addEventListener("updatefound", () => follow(registration.installing, !registration.active));
    window.addEventListener("lowside-apply-update", () => {
      asked = true;
      if (registration.waiting) registration.waiting.postMessage("skip-waiting");
      else window.location.reload();
    });
    checkForUpdates(registration);
  } catch (error) {
    if (root.dataset.offline !== "ready") noOfflineCopy("failed", `The offline copy could not be set up: ${error}`);
  }
}

/** An app left open for days looks again when it comes back to the front, at most once an hour. */
function checkForUpdates(registration) {
  let last = Date.now();
  document.addEventListener("visibilitychange", () => {
    const due = Date.now() - last > UPDATE_CHECK_EVERY_MS;
    if (document.visibilityState !== "visible" || !navigator.onLine || !due) return;
    last = Date.now();
    // Out of reach is the normal case in the field; the next look is in an hour.
    registration.update().catch(() => {});
  });
}

/** Resolves when the whole app is there: until then the offline copy would only compete with it for the connection. */
function whole() {
  if (root.dataset.whole) return Promise.resolve();
  return new Promise((resolve) => {
    const watcher = new MutationObserver(() => {
      watcher.disconnect();
      resolve();
    });
    watcher.observe(root, { attributeFilter: ["data-whole"] });
    setTimeout(resolve, WHOLE_WITHIN_MS);
  });
}

start()
  .then(whole)
  .catch((error) => window.lowsideFailed(inWords(error)))
  // After a failed start too: a newer version may be the cure.
  .finally(keepOfflineCopy);
