export { type VerdictCounts, badness, worstVerdict, trapVerdicts, countVerdicts } from '@riseback/figures';
