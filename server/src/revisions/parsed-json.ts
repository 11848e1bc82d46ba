/** Undefined for a text that is no JSON: what is stored may have been changed by somebody. */
export function parsedJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
