export { badness, countVerdicts, trapVerdicts, type VerdictCounts, worstVerdict } from '@riseback/contracts';
