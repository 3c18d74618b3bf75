/** The options of a command as commander hands them over, under camelCase names. */
export type Told = Readonly<Record<string, string | readonly string[] | boolean | undefined>>;

/** The flag of a field, without its dashes: lot_size is told as --lot-size. */
export const flagOf = (field: string): string => field.replaceAll('_', '-');

/** The text of an option by its flag; undefined where it was not given. */
export function text(told: Told, flag: string): string | undefined {
  const value = told[flag.replace(/-(\w)/g, (_, letter: string) => letter.toUpperCase())];
  return typeof value === 'string' ? value : undefined;
}
