// jsdom lacks CSS.escape, which Angular Material's harnesses call.
if (typeof globalThis.CSS === 'undefined') {
  Object.assign(globalThis, { CSS: { escape: (text: string) => text.replace(/[^\w-]/g, (c) => `\\${c}`) } });
}
