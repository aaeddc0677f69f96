// The package's own types don't pass strict checks, so it comes through this door, with the types beside it.
export { Outcome, Solver } from "odex";
