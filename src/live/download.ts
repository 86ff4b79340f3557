/** Hand a text to the browser as a file to be saved. */
export function download(name: string, text: string): void {
  const address = URL.createObjectURL(new Blob([text], { type: 'application/yaml' }));
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  // The browser has begun to save by then, and may still be asking where to.
  window.setTimeout(() => URL.revokeObjectURL(address), 60_000);
}
