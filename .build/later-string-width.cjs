/**
 * Stands for `string-width` in the bundled command: the package makes tables of all emoji as it is loaded, which takes
 * a fifth of a short command's time, and needs them only where a text is not plain ASCII. What is required here runs
 * at the first call.
 */
const PLAIN = /^[ -~]*$/;

module.exports = (text) => {
  if (PLAIN.test(text)) return text.length;
  // By its path: its name leads here.
  return require('../node_modules/string-width/index.js').default(text);
};
