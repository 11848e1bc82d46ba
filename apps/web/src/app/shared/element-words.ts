export { KIND_WORDS, nameOf, isPipe } from '@riseback/figures';

export { TRAP_TYPE_WORDS } from '@riseback/contracts';
