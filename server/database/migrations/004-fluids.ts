import type { QueryInterface } from "sequelize";

/** When and how a loop's glycol was last tested. */
export const fluids = {
  name: "004-fluids",
  async up(schema: QueryInterface): Promise<void> {
    await schema.sequelize.query(
      `ALTER TABLE \`loop\`
         ADD COLUMN IF NOT EXISTS glycol_tested_on DATE NULL AFTER glycol_basis,
         ADD COLUMN IF NOT EXISTS glycol_test_method
           ENUM('refractometer','hydrometer','laboratory','unknown') NULL AFTER glycol_tested_on`,
    );
  },
};
