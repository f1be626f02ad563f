import manifest from "../package.json";

export const version: string = manifest.version;
