import { fail, type Failure } from '../http/failure';

/** A request that its contract allows and the record does not, told beside one field. */
export const fieldFailure = (path: string, code: string, message: string): Failure =>
  fail('invalid-request', { errors: [{ path, code, message }] });
