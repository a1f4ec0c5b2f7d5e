import fc from "fast-check";
import { test } from "vitest";
import { generated, profiles } from "#tests/shared/rewrite/generated.ts";
import { tune, tuneWhole, bytesOf, read } from "#tests/shared/rewrite/tuning.ts";
import { proveFiles, failures } from "#tests/shared/prove/proving.ts";

const RUNS = Number(process.env.RUNS ?? 300);
const tally = async (name: string, arb: any, body: (v: any) => any) => {
  const seen = new Map<string, [number, any]>();
  await fc.assert(
    fc.asyncProperty(arb, async (v: any) => {
      let msg: string | undefined;
      try {
        msg = await body(v);
      } catch (e) {
        msg =
          "THROW " +
          ((e as any).code ?? "") +
          (e as Error).message +
          ((e as any).code ? "" : (e as Error).stack?.split("\n")[1]);
      }
      if (msg && (!process.env.ONLY || msg.includes(process.env.ONLY))) {
        const key = msg.split(":")[0] + msg.replace(/[\d.]+/g, "#").slice(0, 90);
        const s = seen.get(key);
        if (!s || v.text.length < s[1].text.length) seen.set(key, [(s?.[0] ?? 0) + 1, { ...v, msg }]);
        else s[0]++;
      }
    }),
    { numRuns: RUNS, seed: Number(process.env.SEED ?? 1) },
  );
  for (const [k, [n, v]] of seen) {
    console.log(
      `## ${name}: ${n} × ${k}\n${v.msg}\n${
        process.env.SHOW
          ? v.text +
            "\n----" +
            JSON.stringify(v.machine.channels) +
            "\n" +
            JSON.stringify(v.profile) +
            "\n" +
            (
              (() => {
                try {
                  return tune(v.text, v.machine, v.profile).replace(/;quenchline .*/, ";quenchline");
                } catch (e) {
                  return String(e);
                }
              })()
            )
          : ""
      }`,
    );
  }
  console.log(name, "done", seen.size, "kinds");
};
test(
  "retune",
  () =>
    tally("retune", generated(), (g) => {
      const once = tune(g.text, g.machine, g.profile);
      const twice = tune(once, g.machine, g.profile, { cut: g.cut });
      if (once !== twice) {
        const a = once.split(/\r\n|\n|\r/),
          b = twice.split(/\r\n|\n|\r/);
        const k = a.findIndex((l, i) => l !== b[i] && !l.startsWith(";quench"));
        return (
          `differs ${g.profile.withinLayer}: ` +
          `${a.slice(k - 2, k + 3).join(" / ")} VS ${b.slice(k - 2, k + 3).join(" / ")}`
        );
      }
    }),
  600000,
);
test(
  "proof",
  () =>
    tally("proof", generated(), async (g) => {
      const original = bytesOf(g.text);
      const t = tuneWhole(g.text, g.machine, g.profile);
      const tuned = bytesOf(t.text);
      const f = failures(
        await proveFiles({
          original,
          tuned,
          machine: g.machine,
          profile: g.profile,
          expected: { engine: "0.0.0-test", status: "trial-only" },
        }),
      );
      return f.length ? f.join(" | ") : undefined;
    }),
  600000,
);
test(
  "proof again",
  () =>
    tally("proof again", generated(), async (g) => {
      const original = bytesOf(tune(g.text, g.machine, g.profile));
      const tuned = bytesOf(tune(original.toString("latin1"), g.machine, g.profile));
      const f = failures(
        await proveFiles({
          original,
          tuned,
          machine: g.machine,
          profile: g.profile,
          expected: { engine: "0.0.0-test", status: "trial-only" },
        }),
      );
      return f.length ? f.join(" | ") : undefined;
    }),
  600000,
);
