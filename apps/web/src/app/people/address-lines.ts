import { NewInvitation } from '@riseback/contracts';

/** One address of a pasted list: good, or with what is wrong with it. */
export interface AddressLine {
  /** As it was pasted, from 1. */
  readonly line: number;
  readonly text: string;
  readonly email: string;
  readonly mistake?: string;
}

const AddressShape = NewInvitation.shape.email;

/** Addresses a line each, or parted by commas or semicolons; `Ines Kallan <ines@ternquay.example>` counts as well. */
export function addressLines(pasted: string): AddressLine[] {
  const seen = new Set<string>();
  return pasted.split(/\r?\n/).flatMap((row, index) =>
    row
      .split(/[,;]/)
      .map((part) => part.trim())
      .filter((part) => part !== '')
      .map((text): AddressLine => {
        const email = /<([^<>]*)>\s*$/.exec(text)?.[1]?.trim() ?? text;
        const line = { line: index + 1, text, email };
        if (!AddressShape.safeParse(email).success) return { ...line, mistake: 'is not an e-mail address' };
        const key = email.toLowerCase();
        if (seen.has(key)) return { ...line, mistake: 'stands in the list twice; leave one out' };
        seen.add(key);
        return line;
      }),
  );
}
