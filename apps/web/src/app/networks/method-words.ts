export { COINCIDENCE_WORDS, FRICTION_WORDS, STATIC_LIFT_WORDS, VOID_FRACTION_WORDS } from '@riseback/contracts';
export { METHOD_SENTENCES, type MethodChoice } from '@riseback/methods';

export const DROP_CREDIT_SENTENCE =
  'Share of a fall’s head that counts against the rises. A draining line does not give its head back: leave it at 0 unless the fall runs full.';
export const ACCELERATION_SENTENCE =
  'What it takes to speed the growing flash steam up. Leave it out only to compare with figures that do.';

/** Where the Method view explains a choice: the fragment of its section. */
export function methodSectionId(key: string, value: string): string {
  return `${key}-${value}`;
}
