// The screen for the day the app does not start or stops working. Plain script, no module and no wasm, in the oldest
// syntax that does: it must run where nothing else does. It never clears or changes what is stored.
//
// window.lowsideFailed(message)  shows it; the app's panic handler calls this too. The first message stays on top.
// window.lowsideStarted          set true by boot.js once the app has drawn its first screen.
(function () {
  "use strict";
  var PREFIX = "lowside/";
  var messages = [];
  var panel = null;

  function version() {
    return document.documentElement.getAttribute("data-version") || "unknown";
  }

  function element(tag, className, text) {
    var made = document.createElement(tag);
    if (className) made.className = className;
    if (text) made.textContent = text;
    return made;
  }

  /** Every stored key of this app with its raw text, untouched. */
  function storedData() {
    var found = {};
    var storage = window.localStorage;
    for (var i = 0; i < storage.length; i += 1) {
      var key = storage.key(i);
      if (key !== null && key.indexOf(PREFIX) === 0) found[key] = storage.getItem(key);
    }
    return found;
  }

  /** What stands in the fields on the screen: it may not have been stored yet. */
  function fieldsOnScreen() {
    var fields = document.querySelectorAll("#app input, #app textarea, #app select");
    return Array.prototype.map.call(fields, function (field) {
      var label = field.labels && field.labels[0] ? field.labels[0].textContent : field.getAttribute("aria-label");
      var isTick = field.type === "checkbox" || field.type === "radio";
      return { label: label || field.name || field.id || "", value: isTick ? String(field.checked) : field.value };
    }).filter(function (field) { return field.value !== ""; });
  }

  function rescueFile() {
    var stored = {};
    var note = null;
    try {
      stored = storedData();
    } catch (error) {
      note = "The browser did not let the stored data be read: " + error;
    }
    return {
      app: "lowside",
      kind: "rescue",
      version: version(),
      saved_at: new Date().toISOString(),
      reasons: messages,
      note: note,
      stored: stored,
      fields_on_screen: fieldsOnScreen()
    };
  }

  function save(status) {
    var content = rescueFile();
    var url = URL.createObjectURL(new Blob([JSON.stringify(content, null, 2)], { type: "application/json" }));
    var link = element("a");
    link.href = url;
    link.download = "lowside-rescue-" + content.saved_at.slice(0, 19).replace(/:/g, "") + ".json";
    document.body.appendChild(link);
    link.click();
    document.body.removeChild(link);
    // The browser reads the blob after the click returns.
    setTimeout(function () { URL.revokeObjectURL(url); }, 60000);
    var records = Object.keys(content.stored).length;
    var fields = content.fields_on_screen.length;
    status.textContent = content.note ||
      "Handed to the browser as a download: " + records + (records === 1 ? " stored record" : " stored records") +
      " and " + fields + (fields === 1 ? " filled field" : " filled fields") + " from the screen.";
  }

  /** A newer version that is already on the device is the likeliest cure: let it take over, then load again. */
  function tryAgain() {
    function reload() { window.location.reload(); }
    if (!navigator.serviceWorker || !navigator.serviceWorker.getRegistration) { reload(); return; }
    navigator.serviceWorker.getRegistration().then(function (registration) {
      if (!registration || !registration.waiting) { reload(); return; }
      navigator.serviceWorker.addEventListener("controllerchange", reload);
      registration.waiting.postMessage("skip-waiting");
    }).catch(reload);
  }

  function build() {
    var made = element("section", "failure");
    made.id = "failure";
    made.setAttribute("role", "alert");
    made.setAttribute("data-testid", "failure-screen");
    var started = window.lowsideStarted === true;
    made.appendChild(element("h1", "failure-title", started ? "Lowside has stopped" : "Lowside could not start"));
    made.appendChild(element("p", "", started
      ? "Something in the app broke and it cannot go on. What you stored is still on this device. What you typed is still shown below and goes into the file."
      : "The app could not be loaded in this browser. What you stored is still on this device."));
    var list = element("ul", "failure-reasons");
    made.appendChild(list);
    var status = element("p", "failure-status");
    status.setAttribute("role", "status");
    var saveButton = element("button", "failure-button", "Save my stored data to a file");
    saveButton.type = "button";
    saveButton.setAttribute("data-testid", "failure-save");
    saveButton.addEventListener("click", function () {
      try { save(status); } catch (error) { status.textContent = "The file could not be made: " + error; }
    });
    var againButton = element("button", "failure-button", "Try again");
    againButton.type = "button";
    againButton.setAttribute("data-testid", "failure-retry");
    againButton.addEventListener("click", tryAgain);
    made.appendChild(saveButton);
    made.appendChild(againButton);
    made.appendChild(status);
    made.appendChild(element("p", "failure-version", "Version " + version()));
    return made;
  }

  function show() {
    if (!panel) {
      panel = build();
      document.body.insertBefore(panel, document.body.firstChild);
      var shell = document.getElementById("shell");
      if (shell) shell.hidden = true;
      document.documentElement.setAttribute("data-failed", "yes");
      window.scrollTo(0, 0);
    }
    var list = panel.querySelector(".failure-reasons");
    list.textContent = "";
    messages.forEach(function (message) { list.appendChild(element("li", "", message)); });
  }

  window.lowsideFailed = function (message) {
    var text = String(message || "No reason was given.").slice(0, 2000);
    if (messages.length >= 5 || messages.indexOf(text) !== -1) return;
    messages.push(text);
    if (document.body) show();
    else document.addEventListener("DOMContentLoaded", show);
  };

  /** Ends the app: anything before its first screen, and a wasm trap at any time. Browser extensions also throw here. */
  function isFatal(error) {
    var trapped = typeof WebAssembly === "object" && error instanceof WebAssembly.RuntimeError;
    return trapped || (window.lowsideStarted !== true && error instanceof Error);
  }
  window.addEventListener("error", function (event) {
    if (isFatal(event.error)) window.lowsideFailed(event.message);
  });
  window.addEventListener("unhandledrejection", function (event) {
    if (isFatal(event.reason)) window.lowsideFailed(String(event.reason));
  });

  if (!("noModule" in HTMLScriptElement.prototype) || typeof WebAssembly !== "object") {
    window.lowsideFailed("This browser is too old: it cannot run WebAssembly modules. It needs Chrome 96, Firefox 79, Safari 15.1 or newer.");
  }
}());
