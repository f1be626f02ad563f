import type { ImportDetail } from "@shared/contracts/imports";
import type { Api } from "./api";

/** Brings a file of means, labelled where their step starts, into a point as a person would. */
export async function importMeans(api: Api, pointId: string, bytes: Buffer): Promise<void> {
  const { id } = await api.post<ImportDetail>(`/points/${pointId}/imports`);
  await api.upload(`/imports/${id}/files`, [{ name: "week B.csv", bytes }]);
  const until = async (states: readonly string[]): Promise<ImportDetail> => {
    for (;;) {
      const now = await api.get<ImportDetail>(`/imports/${id}`);
      if (states.includes(now.state)) return now;
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
  };
  const [file] = (await until(["asking", "ready"])).files;
  const recipe = { ...file?.recipe, seriesKind: "meanFromLabel" };
  await api.put(`/imports/${id}/files/${file?.id}/recipe`, recipe);
  await until(["ready"]);
  await api.post(`/imports/${id}/confirm`);
  await until(["imported"]);
}
