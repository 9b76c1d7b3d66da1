import { appointmentView, whenAndWhere, type AppointmentProps } from './appointment';
import { defineTemplate } from './template';
import { shortDate, timeInWords } from './when';

export interface BookingConfirmationProps extends AppointmentProps {
  /** Instant in ISO 8601 until which it can be cancelled online; null leaves the sentence out. */
  cancelUntil: string | null;
}

/** Tells that one appointment or a series was booked. */
export const bookingConfirmation = defineTemplate<BookingConfirmationProps>({
  subject: '{{what}} booked',
  heading: '{{heading}} booked',
  blocks: [
    whenAndWhere,
    { kind: 'button', label: 'See your appointments', address: 'link' },
    {
      kind: 'paragraph',
      only: 'cancelUntil',
      text: 'If you cannot come, please cancel or move it online before {{cancelUntil}}.',
    },
  ],
  view: (props) => {
    const [first, ...rest] = props.appointments;
    const many = `Your ${props.appointments.length} appointments are`;
    return {
      ...appointmentView(props),
      what:
        rest.length > 0
          ? many
          : `Your appointment on ${shortDate(first.startsAt, props.timeZone)} is`,
      heading: rest.length > 0 ? many : 'Your appointment is',
      cancelUntil:
        props.cancelUntil === null ? null : timeInWords(props.cancelUntil, props.timeZone),
    };
  },
});
