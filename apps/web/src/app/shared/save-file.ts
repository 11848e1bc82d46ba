/** Hands a file to the browser, which saves it where the person keeps downloads. */
export function saveFile(name: string, content: Blob): void {
  const url = URL.createObjectURL(content);
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  // the browser reads the content after the click
  setTimeout(() => {
    URL.revokeObjectURL(url);
  }, RELEASE_AFTER_MS);
}

const RELEASE_AFTER_MS = 60_000;

/** A file name without ending that every file system takes. */
export function plainName(text: string, ifNothingIsLeft: string): string {
  const plain = text
    .normalize('NFKD')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-|-$/g, '');
  return plain.toLowerCase() || ifNothingIsLeft;
}
