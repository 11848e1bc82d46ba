import { passwordMistake } from '@riseback/contracts';

const WHAT_DOES = '12 characters or more. A few words do well; spaces and letters of every script count.';

/** While a new password is typed, in the voice of a hint: it is always too short at first. */
export function passwordAdvice(typed: string, personal: readonly string[]): string {
  return typed === '' ? WHAT_DOES : (passwordMistake(typed, personal) ?? 'This will do.');
}
