/*
 * The one way to Skia. Whatever draws with it is exported here, because the bundler moves a module
 * that two asynchronous chunks share into the chunk every page loads.
 */
export { PlotCanvas } from "./plot-canvas";
