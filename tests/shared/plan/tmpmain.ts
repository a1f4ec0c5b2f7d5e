import { planDuties } from "#shared/plan/plan-duties.ts";
import { largeTask } from "./tmptask.ts";

const task = largeTask();
const n = Number(process.argv[2] ?? 30);
const t: number[] = [];
for (let i = 0; i < n; i++) {
  const s = performance.now();
  planDuties(task);
  t.push(performance.now() - s);
}
console.log(t.map((x) => x.toFixed(1)).join(" "));
