/** Changing any expected value in tests/reference needs a new version and a line in README.md. */
export const ENGINE_VERSION = "1.0.0";
