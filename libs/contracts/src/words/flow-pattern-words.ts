import type { FlowPattern } from '../results';

/** What a look into the pipe would show. */
export const FLOW_PATTERN_WORDS: Readonly<Record<FlowPattern, string>> = {
  liquid: 'Liquid',
  vapour: 'Steam',
  stratifiedSmooth: 'Stratified, smooth',
  stratifiedWavy: 'Stratified, wavy',
  intermittent: 'Intermittent',
  annular: 'Annular',
  dispersedBubble: 'Dispersed bubbles',
  bubbly: 'Bubbly',
  slug: 'Slug',
  churn: 'Churn',
};
