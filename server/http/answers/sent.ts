/**
 * A value as it arrives over JSON: what is undefined is left out.
 *
 * Schemas of answers are held to it, so that a description says of every field that there is one.
 */
export type Sent<T> = T extends number ? number : T extends readonly (infer Item)[]
  ? Sent<Item>[]
  : T extends object
    ? { [Key in keyof T as undefined extends T[Key] ? never : Key]: Sent<T[Key]> } & { [Key in keyof T as undefined extends T[Key] ? Key : never]?: Sent<Exclude<T[Key], undefined>> | undefined }
    : T;
