import type { FindingQuantity, FindingText, FindingWords } from './solve-result';

interface Amount {
  readonly quantity: FindingQuantity;
  readonly si: number;
}

/** A number in a sentence, in SI; the names are those of `FindingQuantity`. */
export const amount = (quantity: FindingQuantity, si: number): Amount => ({ quantity, si });

/** A sentence with SI numbers in it: say`Back pressure is ${amount('pressure', p)}`. Empty pieces are left out. */
export function say(words: TemplateStringsArray, ...values: readonly (Amount | string)[]): FindingText {
  const text: (Amount | string)[] = [];
  words.forEach((word, i) => {
    if (word !== '') text.push(word);
    const value = values[i];
    if (value !== undefined) text.push(value);
  });
  return text;
}

/** The same sentence for a reader of plain text, and what would mend it. */
export function findingWords(text: FindingText, remedy?: FindingText): FindingWords {
  const message = plainText(text);
  return remedy === undefined ? { message, text } : { message, text, remedy };
}

/** A sentence in SI units with four significant digits, pressures absolute. */
export function plainText(text: FindingText): string {
  let sentence = '';
  for (const part of text) sentence += typeof part === 'string' ? part : plainAmount(part);
  return sentence;
}

const PLAIN: Readonly<Record<FindingQuantity, { readonly scale: number; readonly unit: string }>> = {
  pressure: { scale: 1e-3, unit: ' kPa abs' },
  pressureDifference: { scale: 1e-3, unit: ' kPa' },
  length: { scale: 1, unit: ' m' },
  massFlow: { scale: 1, unit: ' kg/s' },
  velocity: { scale: 1, unit: ' m/s' },
  temperature: { scale: 1, unit: ' K' },
  temperatureDifference: { scale: 1, unit: ' K' },
  pressureGradient: { scale: 1, unit: ' Pa/m' },
  momentumFlux: { scale: 1, unit: ' Pa' },
  fraction: { scale: 100, unit: ' %' },
  factor: { scale: 1, unit: '' },
};

function plainAmount({ quantity, si }: Amount): string {
  const { scale, unit } = PLAIN[quantity];
  return `${fourDigits(si * scale)}${unit}`;
}

/** Plain decimals without trailing zeros: toPrecision would turn to powers of ten from 10,000 up, and is slow besides. */
function fourDigits(value: number): string {
  const size = Math.abs(value);
  if (size >= 1000) return String(Math.round(value));
  if (size >= 100) return String(Math.round(value * 10) / 10);
  if (size >= 10) return String(Math.round(value * 100) / 100);
  if (size >= 1) return String(Math.round(value * 1000) / 1000);
  return String(Number(value.toPrecision(4)));
}
