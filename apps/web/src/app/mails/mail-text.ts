/** A piece of a mail's text; `href` where it is an address of this application. */
export interface TextPiece {
  readonly text: string;
  readonly href?: string;
}

/** Splits a text at the addresses that lead into this application; whatever leads elsewhere stays text. */
export function textPieces(text: string, origin: string): TextPiece[] {
  return text.split(/(https?:\/\/[^\s<>"']*[^\s<>"'.,;:!?)])/).flatMap((piece, index): TextPiece[] => {
    if (piece === '') return [];
    // every other piece is what the pattern caught
    return index % 2 === 1 && originOf(piece) === origin ? [{ text: piece, href: piece }] : [{ text: piece }];
  });
}

function originOf(address: string): string | undefined {
  return URL.canParse(address) ? new URL(address).origin : undefined;
}
