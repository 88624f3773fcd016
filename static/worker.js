// Runs the app's wasm a second time, in a worker, for the long calculations. Rust's main() sees that there is no window
// and fetches the module that answers; that one calls lowsideListens. Messages that arrive before that are kept and handed over
// in order.

const pending = [];
const keep = (event) => {
  event.stopImmediatePropagation();
  pending.push(event);
};
self.addEventListener("message", keep);

self.lowsideListens = () => {
  self.removeEventListener("message", keep);
  for (const event of pending.splice(0)) {
    self.dispatchEvent(new MessageEvent("message", { data: event.data, ports: [...event.ports] }));
  }
};

// Thrown outside any promise, so that the page's `onerror` on this worker hears of it.
self.lowsideFailed = (why) => {
  setTimeout(() => { throw why instanceof Error ? why : new Error(why); });
};

async function start() {
  const query = new URL(self.location.href).searchParams;
  const own = (name) => {
    const url = new URL(query.get(name) ?? "", self.location.href);
    if (url.origin !== self.location.origin) throw new Error(`the worker was given a foreign address for ${name}`);
    return url.href;
  };
  const wasm = own("wasm");
  const glue = await import(own("js"));
  await glue.default({ module_or_path: fetch(wasm, { credentials: "same-origin" }) });
}

start().catch(self.lowsideFailed);
