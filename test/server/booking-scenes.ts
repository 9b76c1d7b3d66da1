import { v7 as uuidv7 } from 'uuid';
import { openDatabase } from '../../server/database/client';
import { inTransaction } from '../../server/database/transaction';
import { insertAppointments } from '../../server/schedule/booking-repository';
import { buildBooker } from '../builders/schedule';
import {
  bookOver,
  call,
  deskCaller,
  heldIn,
  patientCallers,
  raceDate,
  type Answer,
  type Race,
} from './booking-race';

export const BOOKERS = 200;
export const PLACES = 12;
export const CHANNELS = 4;

const answered = (answers: readonly Answer[], status: number, code?: string): number =>
  answers.filter((answer) => answer.status === status && answer.body.code === code).length;

/** Everyone at once on one class. @returns how many answers of each kind, and how many places its rows hold */
export async function stampede(race: Race) {
  const date = await raceDate(race, { capacity: PLACES });
  const callers = await patientCallers(race, BOOKERS, { monitored: false });
  const answers = await Promise.all(
    callers.map(({ agent }, turn) => bookOver(race, turn, agent, date.id)),
  );
  return {
    booked: answered(answers, 201),
    full: answered(answers, 409, 'class-full'),
    held: await heldIn(race, date.id),
  };
}

/** Patients who need a channel, at once on a class with places left and few channels. */
export async function stampedeOnChannels(race: Race) {
  const date = await raceDate(race, { capacity: 60, monitoredCapacity: CHANNELS });
  const callers = await patientCallers(race, 60);
  const answers = await Promise.all(
    callers.map(({ agent }, turn) => bookOver(race, turn, agent, date.id)),
  );
  return {
    booked: answered(answers, 201),
    full: answered(answers, 409, 'monitors-full'),
    held: await heldIn(race, date.id),
  };
}

/** Each patient asks at once for two classes that overlap. @returns the answers, a pair a patient */
export async function twoPlacesAtOnce(race: Race) {
  const nine = await raceDate(race, { capacity: 60, localStart: '09:00' });
  const half = await raceDate(race, { capacity: 60, localStart: '09:30' });
  const callers = await patientCallers(race, 30);
  return Promise.all(
    callers.map(({ agent }, turn) =>
      Promise.all([bookOver(race, turn, agent, nine.id), bookOver(race, turn + 1, agent, half.id)]),
    ),
  );
}

/** Each patient asks at once for six classes of one day, where two a day and three a course are the limit. */
export async function aWholeDayAtOnce(race: Race) {
  const hours = ['07', '09', '11', '13', '15', '17'];
  const dates = await Promise.all(
    hours.map((hour) => raceDate(race, { capacity: 60, localStart: `${hour}:00` })),
  );
  const callers = await patientCallers(race, 10, { dailyLimit: 2, sessionLimit: 3 });
  const answers = await Promise.all(
    callers.map(({ agent }, turn) =>
      Promise.all(dates.map(({ id }, each) => bookOver(race, turn + each, agent, id))),
    ),
  );
  return answers.map((ofOne) => ofOne.filter(({ status }) => status === 201).length);
}

/** Ten series over the same twenty-four dates, each beginning elsewhere and every other one backwards. */
export async function seriesThatMeet(race: Race) {
  const days = Array.from({ length: 24 }, (_, day) =>
    new Date(Date.now() + (10 + day) * 86_400_000).toISOString().slice(0, 10),
  );
  const ids: string[] = [];
  for (const localDate of days) ids.push((await raceDate(race, { localDate, capacity: 5 })).id);
  const desk = await deskCaller(race);
  const callers = await patientCallers(race, 10);
  const answers = await Promise.all(
    callers.map(({ patientId }, turn) => {
      const classDateIds = [...ids.slice(turn), ...ids.slice(0, turn)];
      if (turn % 2 === 1) classDateIds.reverse();
      const body = { patientId, classDateIds };
      return call(race, turn, desk, { path: '/api/appointments/series', body });
    }),
  );
  return {
    booked: answered(answers, 201),
    full: answered(answers, 409, 'class-full'),
    held: await Promise.all(ids.map((id) => heldIn(race, id))),
  };
}

const pause = () => new Promise((resolve) => setTimeout(resolve, 50));

/** Two transactions of one patient, each of which takes a place and then one that overlaps the other's. */
export async function oneAgainstOneself(race: Race): Promise<void> {
  const hours = ['08:00', '18:00', '18:30', '08:30'];
  const dates = await Promise.all(hours.map((localStart) => raceDate(race, { localStart })));
  const [morning, evening, overEvening, overMorning] = dates.map(({ id }) => id);
  const { testDatabase, context } = race.testApp;
  const { user, patient } = await buildBooker(context.database, race.site);
  const own = openDatabase(testDatabase.url);
  const taking = (classDateIds: readonly (string | undefined)[]) =>
    inTransaction(own, async (tx) => {
      for (const id of classDateIds) {
        await insertAppointments(tx, {
          ids: [uuidv7()],
          classDateIds: [id ?? ''],
          patientId: patient.id,
          createdBy: user.id,
          at: new Date(),
        });
        await pause();
      }
    });
  await Promise.allSettled([taking([morning, evening]), taking([overEvening, overMorning])]);
  await own.$client.end();
}
