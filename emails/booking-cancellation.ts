import { appointmentView, whenAndWhere, type AppointmentProps } from './appointment';
import { defineTemplate } from './template';
import { shortDate } from './when';

export interface BookingCancellationProps extends AppointmentProps {
  /** Who cancelled: the patient, or the staff for them. */
  by: 'patient' | 'staff';
}

/** Tells that one appointment or more were cancelled. */
export const bookingCancellation = defineTemplate<BookingCancellationProps>({
  subject: '{{what}} cancelled',
  heading: '{{heading}} cancelled',
  blocks: [
    {
      kind: 'paragraph',
      only: 'byStaff',
      text: 'We had to cancel for you. Please choose another time, or call us if you need help.',
    },
    { kind: 'paragraph', only: 'byPatient', text: 'You do not need to do anything else.' },
    whenAndWhere,
    { kind: 'button', label: 'Choose another time', address: 'link' },
  ],
  view: (props) => {
    const [first, ...rest] = props.appointments;
    const many = `${props.appointments.length} appointments are`;
    return {
      ...appointmentView(props),
      what:
        rest.length > 0
          ? many
          : `Your appointment on ${shortDate(first.startsAt, props.timeZone)} is`,
      heading: rest.length > 0 ? many : 'Your appointment is',
      byStaff: props.by === 'staff' ? 'yes' : null,
      byPatient: props.by === 'patient' ? 'yes' : null,
    };
  },
});
