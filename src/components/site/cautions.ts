/** The product's cautions, worded once. Shown on every suggestion and every launch sheet; never shortened there. */

export const CAUTION_STATISTICAL =
  'This is a statistical suggestion from past passes, not an instruction. The crew chief decides.';
export const CAUTION_LIMITS = "Stay inside the maker's limits and the sanctioning body's rules.";
export const CAUTION_INSPECTED =
  'Clutch containment, fasteners and shields are inspected by a qualified person before every run.';
export const CAUTION_WORK = 'Work on the clutch only with the engine off, the clutch cool and the car secured.';
export const CAUTION_DOUBT = 'If in doubt, do not run.';

/** In reading order; the last one is set in bold. */
export const CAUTIONS = [CAUTION_STATISTICAL, CAUTION_LIMITS, CAUTION_INSPECTED, CAUTION_WORK, CAUTION_DOUBT] as const;
