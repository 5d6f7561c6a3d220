// Before the worker's text. Pyodide takes a worker that can import scripts for one it does not support, so the probe must fail.
self.importScripts = () => { throw new TypeError("everything is in this text"); };
const ONE_FILE_BASE = "one-file:///";
let oneFileFiles = {};
self.addEventListener("message", (event) => {
  if (event.data.type !== "files") return;
  event.stopImmediatePropagation();
  oneFileFiles = event.data.files;
});
self.fetch = async (resource) => {
  const file = oneFileFiles[String(resource?.url ?? resource).replace(ONE_FILE_BASE, "")];
  if (!file) throw new TypeError(`${resource} is not in this file`);
  return new Response(file.bytes, { headers: { "Content-Type": file.type } });
};
