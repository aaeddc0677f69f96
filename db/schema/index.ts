export * from "./users";
export * from "./outbreaks";
export * from "./measures";
export * from "./assessments";
export * from "./briefings";
export * from "./publications";
export * from "./subscribers";
