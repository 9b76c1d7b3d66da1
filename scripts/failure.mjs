/**
 * Something that a person can put right: one sentence, or what was being done, why it failed and what to type next.
 */
export class SetupFailure extends Error {
  /**
   * @param {object} details
   * @param {string} details.why the reason, in a person's words
   * @param {string} [details.did] what was being done; left out where the reason says it all
   * @param {string} [details.type] what to type next
   */
  constructor({ did = '', why, type = '' }) {
    super(why);
    this.name = 'SetupFailure';
    this.did = did;
    this.why = why;
    this.type = type;
  }
}
