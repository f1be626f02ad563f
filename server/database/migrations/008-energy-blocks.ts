import type { QueryInterface } from "sequelize";

/*
 * Glycol is worked out, so it blocks no energy any more, and readings are held against the loop's own
 * fluid. Reasons become plain text: another one then needs no step. Points of glycol loops are worked
 * out again by a job each, as after a change of the loop; a job that already waits is left alone.
 */
const changes = [
  `ALTER TABLE point_readings
     MODIFY COLUMN blocked_by VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NULL`,
  `UPDATE point_readings SET blocked_by = 'outsideFluid' WHERE blocked_by = 'outsideWater'`,
  `INSERT IGNORE INTO job (organisation_id, kind, state, point_id, waiting_key, run_after, progress,
          created_at)
   SELECT p.organisation_id, 'recalculate', 'queued', p.id, CONCAT('recalculate-', p.id),
          UTC_TIMESTAMP(3),
          '{"stage":"waiting","rowsRead":0,"rowsTotal":null,"secondsLeft":null}', UTC_TIMESTAMP(3)
     FROM metering_point p JOIN \`loop\` l ON l.id = p.loop_id
    WHERE l.fluid_kind <> 'water' AND EXISTS (
          SELECT 1 FROM point_readings r WHERE r.point_id = p.id AND r.blocked_by = 'glycol')`,
  // Only now: a killed step must find its points again.
  `UPDATE point_readings SET blocked_by = NULL WHERE blocked_by = 'glycol'`,
  // The checks of imports are kept as they were answered.
  `UPDATE log_import
      SET checks = REPLACE(REPLACE(REPLACE(checks,
            '"rowsOutsideWater"', '"rowsOutsideFluid"'),
            '"outsideWaterExamples"', '"outsideFluidExamples"'),
            '"energyBlockedBy":"outsideWater"', '"energyBlockedBy":"outsideFluid"')
    WHERE checks LIKE '%utsideWater%'`,
  `UPDATE log_import SET checks = REPLACE(checks, '"energyBlockedBy":"glycol"', '"energyBlockedBy":null')
    WHERE checks LIKE '%"energyBlockedBy":"glycol"%'`,
];

/** Reasons why a point gives no energy, without glycol being one. */
export const energyBlocks = {
  name: "008-energy-blocks",
  async up(schema: QueryInterface): Promise<void> {
    for (const change of changes) await schema.sequelize.query(change);
  },
};
