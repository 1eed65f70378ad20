/** How often a property is tried: a thousand times, or as often as `PROPERTY_RUNS` says (fewer under mutation testing, more in a long search). */
export const PROPERTY_RUNS = Number(process.env.PROPERTY_RUNS ?? '1000');
