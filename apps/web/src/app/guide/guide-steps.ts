/** One thing shown on the person's own screen, in the view where it stands. */
export interface GuideStep {
  readonly view: 'drawing' | 'ledger' | 'cases' | 'try';
  readonly query: Readonly<Record<string, string | null>>;
  /** What is pointed out, as a selector; the first that is there counts. */
  readonly anchor: string;
  readonly title: string;
  readonly words: string;
}

/** The trap that the guide walks with. */
export interface GuideTrap {
  readonly id: string;
  readonly tag: string;
  readonly fails: boolean;
  readonly caseId: string;
}

/** From what is wrong to what can be done, along one trap. */
export function guideSteps({ id, tag, fails, caseId }: GuideTrap): readonly GuideStep[] {
  const here = { case: caseId, element: id, show: null };
  return [
    {
      view: 'drawing',
      query: here,
      anchor: `[data-element="${CSS.escape(id)}"]`,
      title: `Trap ${tag}`,
      words: fails
        ? 'The solid diamond says that it fails: at this case it cannot drain what it must. The colour of the pipes is the pressure in them; the key at the top left says which.'
        : 'The colour of the pipes is the pressure in them; the key at the top left says which. A solid diamond would say that a trap fails.',
    },
    {
      view: 'drawing',
      query: here,
      anchor: 'app-staff',
      title: 'What stands against it',
      words:
        'The staff is filled from the foot: receiver, lift, friction, flash steam. Together they are the back pressure. What is empty above drives the condensate; the pointer at the left is the limit.',
    },
    {
      view: 'drawing',
      query: here,
      anchor: 'app-findings-list',
      title: 'What is wrong, and what would mend it',
      words: 'Worst first. Press a tag to see it on the drawing; the zone says where on the sheet.',
    },
    {
      view: 'ledger',
      query: here,
      anchor: 'app-ledger-table',
      title: 'The same figure as an account',
      words:
        'It opens at the receiver, takes pipe after pipe, and closes at the trap. Each column adds up to the digit, and the half-psi-a-foot rule stands beside it. It prints on one page.',
    },
    {
      view: 'cases',
      query: { ...here, show: 'compare' },
      anchor: 'app-comparison-table',
      title: 'Every way the plant runs',
      words: 'Each trap in each case side by side, and the worst of all at the right.',
    },
    {
      view: 'try',
      query: here,
      anchor: 'app-trial-form',
      title: 'What to do about it',
      words:
        'Try a larger pipe, another receiver pressure or another load on a scratch copy. See what turns at every trap; then keep it or drop it. Your own network begins at the site, with “New network”.',
    },
  ];
}
