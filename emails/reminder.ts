import { appointmentView, whenAndWhere, type AppointmentProps } from './appointment';
import { webAddress } from './clean-text';
import { defineTemplate } from './template';
import { shortDate } from './when';

export interface ReminderProps extends AppointmentProps {
  /** Where reminders are stopped without signing in; null leaves the link out. */
  unsubscribeLink: string | null;
}

/** Reminds of the next appointment, the day before. */
export const reminder = defineTemplate<ReminderProps>({
  subject: 'Your appointment on {{date}}',
  heading: 'Your appointment on {{date}}',
  blocks: [
    { kind: 'paragraph', text: 'This is to remind you of your appointment.' },
    whenAndWhere,
    { kind: 'paragraph', text: 'If you cannot come, please cancel or move it now.' },
    { kind: 'button', label: 'See your appointment', address: 'link' },
    {
      kind: 'link',
      only: 'unsubscribeLink',
      label: 'Stop these reminders',
      address: 'unsubscribeLink',
    },
  ],
  view: (props) => ({
    ...appointmentView(props),
    date: shortDate(props.appointments[0].startsAt, props.timeZone),
    unsubscribeLink: props.unsubscribeLink === null ? null : webAddress(props.unsubscribeLink),
  }),
});
