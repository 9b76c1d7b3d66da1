import { cleanText, webAddress } from './clean-text';
import type { Letter } from './template';
import { spanInWords, type TimeSpan } from './when';

/** What the messages about appointments have in common. */
export interface AppointmentProps extends Letter {
  /** One, or those of a series, in order. */
  appointments: readonly [TimeSpan, ...TimeSpan[]];
  /** IANA zone in which the times are told. */
  timeZone: string;
  /** A neutral name and the address by line: what kind of care it is must not show. */
  place: readonly string[];
  /** Where appointments are seen and changed. */
  link: string;
}

export interface AppointmentView {
  when: string[];
  where: string[];
  link: string;
}

export function appointmentView(props: AppointmentProps): AppointmentView {
  return {
    when: props.appointments.map((span) => spanInWords(span, props.timeZone)),
    where: props.place.map(cleanText).filter(Boolean),
    link: webAddress(props.link),
  };
}

export const whenAndWhere = {
  kind: 'facts',
  rows: [
    { label: 'When', lines: 'when' },
    { label: 'Where', lines: 'where' },
  ],
} as const;
