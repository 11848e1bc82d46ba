import type { Ink } from '@riseback/figures';

/** The light set of docs/look.md on white paper, where grounds are lighter than on a screen. */
export const INKS: Readonly<Record<Ink, string>> = {
  ink: '#17222a',
  ink2: '#445158',
  ink3: '#5c676c',
  rule: '#d3d6cd',
  ruleStrong: '#798184',
  paper: '#ffffff',
  ground: '#f1f2ee',
  copper: '#94461a',
  copperLine: '#b5622f',
  copperWash: '#f9eee5',
  fail: '#9e1239',
  watch: '#6b5300',
  pass: '#235f4b',
  // the screen's third class at 45 % on white
  water: '#aed5de',
  p1: '#a8dace',
  p2: '#6ec0bf',
  p3: '#4aa2b5',
  p4: '#3582a8',
  p5: '#2f609a',
  p6: '#303d83',
  p7: '#2b1e5b',
};
