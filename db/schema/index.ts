export * from "./people";
export * from "./workspaces";
export * from "./scenarios";
export * from "./shares";
export * from "./audit";
export * from "./limits";
