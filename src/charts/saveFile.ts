/** Hands a file that was made in the page to the person. */
export function saveFile(name: string, content: Blob): void {
  const address = URL.createObjectURL(content);
  const link = document.createElement("a");
  link.href = address;
  link.download = name;
  link.click();
  // The browser has taken the file over by then; an address left behind would keep it in memory.
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}

/** A name for a file: words of a title, as any system can keep them. */
export const fileName = (title: string, ending: string) =>
  `${title
    .normalize("NFKD")
    .replace(/[^\w]+/gu, "-")
    .replace(/^-+|-+$/gu, "")
    .slice(0, 80)
    .toLowerCase()}.${ending}`;
