type Blankable<Fields> = {
  readonly [Name in keyof Fields as undefined extends Fields[Name] ? never : Name]: Fields[Name];
} & {
  readonly [Name in keyof Fields as undefined extends Fields[Name] ? Name : never]?: Exclude<
    Fields[Name],
    undefined
  >;
};

/**
 * An object without the fields that are undefined: a blank cell is no field.
 *
 * @param fields - any object
 * @returns a copy that holds the other fields
 */
export function withoutBlanks<Fields extends object>(fields: Fields): Blankable<Fields> {
  const held = Object.entries(fields).filter(([, value]) => value !== undefined);
  return Object.fromEntries(held) as Blankable<Fields>;
}
