import fc from "fast-check";
import { plan } from "#tests/helpers/planning.ts";
import { path } from "#tests/helpers/steps.ts";
import { EVERY_RULE } from "#tests/helpers/tern.ts";
import { wholeFilePlan } from "./whole-file-plan.ts";
for (const [name, m] of EVERY_RULE) {
  let worst=0;
  for (let seed=1; seed<1500; seed++) {
    const [steps] = fc.sample(path(160,60), {seed: seed*7919, numRuns:1});
    const a=plan(steps,m).timeS, b=wholeFilePlan(steps,m);
    const k=b.findIndex((t,i)=>Math.abs(a[i]/t-1)>1e-10);
    if(k>=0){ 
      const idx=b.map((t,i)=>i).filter(i=>Math.abs(a[i]/b[i]-1)>1e-10);
      console.log(name,"seed",seed,"n",steps.length,"differs at",idx.length, idx[0], idx[idx.length-1], "sum diff", a.reduce((x,y)=>x+y,0)-b.reduce((x,y)=>x+y,0));
      for(let i=Math.max(0,idx[0]-3);i<=Math.min(b.length-1,idx[idx.length-1]+3, idx[0]+14);i++) console.log("  ",i,JSON.stringify(steps[i]),a[i],b[i], (a[i]/b[i]-1).toExponential(2));
      if(++worst>2) break;
    }
  }
}
