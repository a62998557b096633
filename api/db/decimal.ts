/** PostgreSQL's numeric comes as text; the few columns that use it fit a double exactly enough (four decimals). */
export const decimal = {
  to: (value: number | null): number | null => value,
  from: (value: string | null): number | null => (value === null ? null : Number(value)),
};
