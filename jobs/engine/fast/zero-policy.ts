/** When to tell zero columns beforehand: by cost, always or never. All give the same results. */
export type ZeroTests = 'auto' | 'always' | 'never';
