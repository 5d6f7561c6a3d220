/** Ways off this device: the share sheet where there is one, else a download or the clipboard. Called inside the tap, with everything ready. */

/** @param {ShareData} what @returns {Promise<boolean>} whether it was taken, or the person changed their mind */
async function shared(what) {
  try {
    await navigator.share(what);
    return true;
  } catch (error) {
    return error.name === "AbortError";
  }
}

const onTouch = () => matchMedia("(pointer: coarse)").matches;

/** Devices whose share sheet is the only way to a file take few kinds; text is always among them. @returns {File | null} */
function shareable(text, name, type) {
  if (!onTouch() || !navigator.canShare) return null;
  const kinds = [[name, type], [`${name}.txt`, "text/plain"]];
  return kinds.map(([named, kind]) => new File([text], named, { type: kind })).find((file) => navigator.canShare({ files: [file] })) ?? null;
}

/** @param {string} text @param {string} name @param {string} type @returns {Promise<string>} what to tell the person */
export async function handOverFile(text, name, type) {
  const file = shareable(text, name, type);
  if (file && await shared({ files: [file], title: name })) return "";
  const link = document.createElement("a");
  link.href = URL.createObjectURL(new Blob([text], { type }));
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 60_000);
  return `Saved as ${name}, where this browser puts downloads.`;
}

export const canShare = () => Boolean(navigator.share);

/** @param {ShareData} what */
export async function handOverBySharing(what) {
  return await shared(what) ? "" : "The share sheet did not open. Copy it instead.";
}

/** @param {string} text @param {string} copied what to say when it worked */
export async function copyOver(text, copied) {
  try {
    await navigator.clipboard.writeText(text);
    return copied;
  } catch {
    return "This browser does not let the page copy. Select it by hand.";
  }
}
