export { prescriptionAnswerSchema } from './prescription-answer';
export { prescriptionRequestSchema } from './prescription-request';
export type { PrescriptionRequestInput } from './prescription-request';
