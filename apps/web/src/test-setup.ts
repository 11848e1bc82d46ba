import fc from 'fast-check';

// jsdom lacks CSS.escape, which Angular Material's harnesses call.
if (typeof globalThis.CSS === 'undefined') {
  Object.assign(globalThis, { CSS: { escape: (text: string) => text.replace(/[^\w-]/g, (c) => `\\${c}`) } });
}

// The same sample at every run, so that a change and not chance makes a property fail.
fc.configureGlobal({ seed: 20_261_201 });
