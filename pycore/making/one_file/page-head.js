// Before the page's text: unpack the files, then start the page.
globalThis.ONE_FILE = { worker: "", files: {} };
const ONE_FILE_BASE = "one-file:///";
const plainFetch = globalThis.fetch;
globalThis.fetch = async (resource, options) => {
  const file = globalThis.ONE_FILE.files[String(resource).replace(ONE_FILE_BASE, "")];
  return file ? new Response(file.bytes, { headers: { "Content-Type": file.type } }) : plainFetch(resource, options);
};
async function unpacked(node) {
  const packed = Uint8Array.from(atob(node.textContent), (sign) => sign.charCodeAt(0));
  const stream = new Blob([packed]).stream().pipeThrough(new DecompressionStream("gzip"));
  return new Uint8Array(await new Response(stream).arrayBuffer());
}
async function unpackAll() {
  await Promise.all([...document.querySelectorAll("script[data-file]")].map(async (node) => {
    const bytes = await unpacked(node);
    if (node.dataset.file === "worker") globalThis.ONE_FILE.worker = new TextDecoder().decode(bytes);
    else globalThis.ONE_FILE.files[node.dataset.file] = { bytes, type: node.dataset.type };
    node.remove();
  }));
}
