/** Addresses of the import screens; the wizard keeps its step and file in the URL. */
export const importPaths = {
  logs: "/logs",
  start: (pointId?: string) => (pointId ? `/logs/new?point=${pointId}` : "/logs/new"),
  recipes: "/logs/recipes",
  recipe: (recipeId: string) => `/logs/recipes/${recipeId}`,
  batches: "/logs/batches",
  batch: (batchId: string) => `/logs/batches/${batchId}`,
  wizard: (importId: string, step?: string, fileId?: string) => {
    const query = new URLSearchParams();
    if (step) query.set("step", step);
    if (fileId) query.set("file", fileId);
    const text = query.toString();
    return `/logs/${importId}${text ? `?${text}` : ""}`;
  },
} as const;
