/**
 * Stands for `Intl.Segmenter` in the bundled command (see `bundle` in package.json). `string-width` makes one as it
 * is loaded, which takes 20 ms; it is asked only where a text is not plain ASCII.
 */
export class LaterSegmenter {
  #segmenter: Intl.Segmenter | undefined;
  readonly #given: ConstructorParameters<typeof Intl.Segmenter>;

  constructor(...given: ConstructorParameters<typeof Intl.Segmenter>) {
    this.#given = given;
  }

  segment(text: string): Intl.Segments {
    // Not `Intl.Segmenter` as it stands: that name is the one replaced.
    this.#segmenter ??= new globalThis.Intl.Segmenter(...this.#given);
    return this.#segmenter.segment(text);
  }
}
