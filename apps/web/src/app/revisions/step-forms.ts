import type { RevisionDeed } from '@riseback/contracts';
import type { RevisionStep } from './revision-api';

/** How a step is asked for: its button, and the note that goes with it. */
export interface StepForm {
  readonly step: RevisionStep;
  readonly deed: RevisionDeed;
  readonly button: string;
  readonly label: string;
  readonly hint: string;
  /** A return and a withdrawal say why. */
  readonly required: boolean;
}

export const STEP_FORMS: readonly StepForm[] = [
  {
    step: 'submission',
    deed: 'submit',
    button: 'Submit for review',
    label: 'Note to the reviewers',
    hint: 'If you like: what to look at first. They are told by mail.',
    required: false,
  },
  {
    step: 'return',
    deed: 'return',
    button: 'Return with comments',
    label: 'Why it is returned',
    hint: 'The designer is told by mail; comments pinned to elements go along.',
    required: true,
  },
  {
    step: 'withdrawal',
    deed: 'withdraw',
    button: 'Withdraw',
    label: 'Why it is withdrawn',
    hint: 'It is kept and can be read, but never signed.',
    required: true,
  },
];
