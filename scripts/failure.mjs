/** A step that could not be done: what was tried, why it failed and what the person may type next. */
export class SetupFailure extends Error {
  /**
   * @param {object} details
   * @param {string} details.did what was being done
   * @param {string} details.why the reason, in a person's words
   * @param {string} [details.type] what to type next
   */
  constructor({ did, why, type }) {
    super(why);
    this.name = 'SetupFailure';
    this.did = did;
    this.why = why;
    this.type = type;
  }
}
