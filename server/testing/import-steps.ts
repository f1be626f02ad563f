import type { ImportDetail } from "@shared/contracts/imports";
import type { FileRecipe } from "@shared/domain/log-files/recipe";
import type { Agent } from "./factories";
import { runJobs } from "./run-jobs";
import type { TestApp } from "./test-app";

/** The steps of an import as a script takes them; each waits for the jobs it starts. */
export function importSteps(app: TestApp) {
  async function read(agent: Agent, importId: string): Promise<ImportDetail> {
    return (await agent.get(`/imports/${importId}`).expect(200)).body as ImportDetail;
  }

  return {
    read,

    async uploaded(agent: Agent, pointId: string, text: string): Promise<ImportDetail> {
      const opened = await agent.post(`/points/${pointId}/imports`).expect(201);
      const { id } = opened.body as ImportDetail;
      const request = agent.post(`/imports/${id}/files`);
      await request.attach("file", Buffer.from(text), "log.csv").expect(201);
      await runJobs(app);
      return read(agent, id);
    },

    /** Gives the only file its recipe back, changed; unchanged it answers what it states. */
    async answered(
      agent: Agent,
      detail: ImportDetail,
      change: (recipe: FileRecipe) => FileRecipe = (recipe) => recipe,
    ): Promise<ImportDetail> {
      const [file] = detail.files;
      if (!file?.recipe) throw new Error("the file has no recipe");
      await agent
        .put(`/imports/${detail.id}/files/${file.id}/recipe`)
        .send(change(file.recipe))
        .expect(200);
      await runJobs(app);
      return read(agent, detail.id);
    },

    async stored(agent: Agent, { id }: ImportDetail): Promise<ImportDetail> {
      await agent.post(`/imports/${id}/confirm`).expect(202);
      await runJobs(app);
      return read(agent, id);
    },
  };
}
