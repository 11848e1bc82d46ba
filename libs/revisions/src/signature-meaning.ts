/** What a signature says. Only `approved` ends the review. */
export type SignatureMeaning = 'reviewed' | 'approved';

/** The worst check of each trap, each trap once: by its worst case. */
export interface TrapVerdicts {
  readonly traps: number;
  readonly fail: number;
  readonly watch: number;
}

/** What a signature is about, in so far as its sentences tell it. */
export interface SignedMatter {
  readonly personName: string;
  readonly role: string;
  readonly networkName: string;
  readonly networkVersion: number;
  readonly letter: string;
  readonly title: string;
  readonly fileHash: string;
  readonly resultsHash: string;
  readonly engineVersion: string;
  readonly verdicts: TrapVerdicts;
  readonly openComments: number;
  /** Names of cases that have no solution. */
  readonly unsolvedCases: readonly string[];
  /** How many elements the solve left out because they reach no receiver. */
  readonly leftOut: number;
}

const CAUTIONS: readonly string[] = [
  'Steam and hot condensate burn and kill; water hammer breaks pipes. Nobody opens a line, a trap or a gauge connection on the word of a calculation.',
  'The calculation is a steady state of what was typed. It does not replace local codes or the judgement of a licensed engineer.',
];

/**
 * What a signature means, word for word: first what is declared, then what it rests on, then the cautions. They are shown before the
 * signature is made and are part of what is signed.
 */
export function signatureSentences(meaning: SignatureMeaning, matter: SignedMatter): string[] {
  const { fileHash, resultsHash, engineVersion } = matter;
  return [
    declaration(meaning, matter),
    `It stands for the frozen inputs with the SHA-256 ${fileHash} and the results with the SHA-256 ${resultsHash}, computed by engine ${engineVersion}, and for nothing else.`,
    verdictSentence(matter.verdicts),
    ...gaps(matter),
    ...CAUTIONS,
  ];
}

function declaration(meaning: SignatureMeaning, matter: SignedMatter): string {
  const { personName, role, letter, title, networkName, networkVersion } = matter;
  const what = `revision ${letter}, “${title}”, of the network “${networkName}” at its version ${networkVersion}`;
  const who = `I, ${personName}, ${role} at the site`;
  if (meaning === 'reviewed') return `${who}, have reviewed ${what}. This does not approve it.`;
  return `${who}, have reviewed and approve ${what}. This ends its review and supersedes any revision approved before it.`;
}

function verdictSentence({ traps, fail, watch }: TrapVerdicts): string {
  if (traps === 0) return 'No trap has a result.';
  const of = `Of ${counted(traps, 'trap')}, each by its worst case, `;
  if (fail === 0 && watch === 0) return `${of}none fails a check and none has to be watched.`;
  return `${of}${fail} ${fail === 1 ? 'fails' : 'fail'} a check and ${watch} more ${watch === 1 ? 'has' : 'have'} to be watched.`;
}

function gaps({ unsolvedCases, leftOut, openComments }: SignedMatter): string[] {
  const cases = unsolvedCases.map((name) => `“${name}”`).join(', ');
  return [
    ...(unsolvedCases.length === 0
      ? []
      : [
          `No solution was found for ${counted(unsolvedCases.length, 'case')}: ${cases}. The results say nothing of it.`,
        ]),
    ...(leftOut === 0
      ? []
      : [
          `${counted(leftOut, 'element')} from which no receiver can be reached ${leftOut === 1 ? 'is' : 'are'} in no result.`,
        ]),
    ...(openComments === 0
      ? []
      : [`${counted(openComments, 'comment')} on this revision ${openComments === 1 ? 'is' : 'are'} still open.`]),
  ];
}

function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}
