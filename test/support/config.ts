/** Swaps that the engine's agreement test compares with the slow path; the whole is 200,000. */
export const AGREEMENT_SWAPS = Number(process.env.HEDDLE_AGREEMENT_SWAPS ?? 20_000);
