/** A new gauge whose fields are being asked for, and what it taps; on a pipe how far from the pipe's start. */
export type GaugeDraft = { readonly node: string } | { readonly pipe: string; readonly distanceM: number };
