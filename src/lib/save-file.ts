/** Hands a file to the browser, which saves it where its person wants it. */
export function saveFile(name: string, content: Blob): void {
  const address = URL.createObjectURL(content);
  const link = document.createElement("a");
  link.href = address;
  link.download = name;
  link.click();
  // The browser reads the address once the click has been handled.
  setTimeout(() => URL.revokeObjectURL(address), 60_000);
}
