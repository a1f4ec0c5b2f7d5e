import fc from "fast-check";

// Property tests try the same cases in every run, so that a build never fails for a reason that the change did not bring.
// A search for new cases: SEED=$RANDOM npm test.
fc.configureGlobal({ seed: Number(process.env.SEED ?? 20261201) });
