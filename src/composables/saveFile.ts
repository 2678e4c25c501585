/** Hands a file to the browser to be saved under a name. */
export function saveFile(file: Blob, name: string): void {
  const url = URL.createObjectURL(file);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  document.body.append(link);
  link.click();
  link.remove();
  // The browser reads the address after the click returns.
  setTimeout(() => URL.revokeObjectURL(url), 60_000);
}
