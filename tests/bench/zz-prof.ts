import { plant, solve } from './zz-bench';
for (const n of [2000, 10000, 50000]) { const f = plant(n); solve(f); let s=Date.now(); solve(f); const a=Date.now()-s; s=Date.now(); solve(f,{bands:true}); console.log(n,'plain',a,'bands',Date.now()-s); }
