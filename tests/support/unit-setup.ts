import fc from "fast-check";

// In CI the random documents are the same on every run, so that a change is judged by what it changes; by hand they differ
// each time and go on looking. What they find is kept as a test of its own.
if (process.env.CI) fc.configureGlobal({ seed: 20261201 });
