import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { deadlocksOf, overlapsIn, startRace, type Race } from './booking-race';
import {
  aWholeDayAtOnce,
  CHANNELS,
  oneAgainstOneself,
  PLACES,
  stampede,
  stampedeOnChannels,
  twoPlacesAtOnce,
} from './booking-scenes';

// The races of booking-races.spec.ts against a database whose guard was taken out: they must find what it prevents.

describe('without the database’s last word', () => {
  let race: Race;
  beforeAll(async () => {
    race = await startRace(`
      ALTER TABLE class_dates DROP CONSTRAINT class_dates_places;
      ALTER TABLE class_dates DROP CONSTRAINT class_dates_monitors;
      ALTER TABLE patient_days DROP CONSTRAINT patient_days_limit;
      ALTER TABLE enrollments DROP CONSTRAINT enrollments_course_limit;
      ALTER TABLE appointments DROP CONSTRAINT appointments_no_overlap;`);
  });
  afterAll(() => race.close());

  it('the stampede overbooks the class', async () => {
    const { held } = await stampede(race);
    expect(held).toBeGreaterThan(PLACES);
  });

  it('more patients need a channel than there are', async () => {
    const { held } = await stampedeOnChannels(race);
    expect(held).toBeGreaterThan(CHANNELS);
  });

  it('a patient gets more than the day allows', async () => {
    expect(Math.max(...(await aWholeDayAtOnce(race)))).toBeGreaterThan(2);
  });

  it('a patient is in two places at once', async () => {
    await twoPlacesAtOnce(race);
    expect(await overlapsIn(race)).toBeGreaterThan(0);
  });
});

describe('without the lock that bookings of one patient queue on', () => {
  let race: Race;
  beforeAll(async () => {
    race = await startRace(`
      CREATE OR REPLACE FUNCTION lock_patient_booking(patient uuid) RETURNS void LANGUAGE sql AS $$ SELECT $$;`);
  });
  afterAll(() => race.close());

  it('they deadlock', async () => {
    await oneAgainstOneself(race);
    expect(await deadlocksOf(race)).toBeGreaterThan(0);
  });
});
