/**
 * Order of names, for lists that must not depend on the order of rows: figures by their value, so that
 * K2 comes before K10, the rest by character code.
 *
 * @param a - a name
 * @param b - another
 * @returns below 0 where a comes first, above 0 where b does, 0 only for equal names
 */
export function byName(a: string, b: string): number {
  const [piecesA, piecesB] = [pieces(a), pieces(b)];
  for (let i = 0; i < piecesA.length && i < piecesB.length; i++) {
    const order = pieceOrder(piecesA[i]!, piecesB[i]!);
    if (order !== 0) return order;
  }
  // '01' and '1' have the same value and are two names all the same.
  return piecesA.length - piecesB.length || textOrder(a, b);
}

/**
 * Things in the order of their names.
 *
 * @param things - any things
 * @param nameOf - the name of one
 * @returns a sorted copy
 */
export function inNameOrder<Thing>(
  things: Iterable<Thing>,
  nameOf: (thing: Thing) => string,
): Thing[] {
  return [...things].sort((a, b) => byName(nameOf(a), nameOf(b)));
}

function pieces(name: string): readonly string[] {
  return name.match(/[0-9]+|[^0-9]+/g) ?? [];
}

function pieceOrder(a: string, b: string): number {
  if (!/^[0-9]/.test(a) || !/^[0-9]/.test(b)) return textOrder(a, b);
  const [figuresA, figuresB] = [a.replace(/^0+/, ''), b.replace(/^0+/, '')];
  // Of two numbers without leading zeros the longer one is greater, however long.
  return figuresA.length - figuresB.length || textOrder(figuresA, figuresB);
}

function textOrder(a: string, b: string): number {
  return a < b ? -1 : Number(a > b);
}
