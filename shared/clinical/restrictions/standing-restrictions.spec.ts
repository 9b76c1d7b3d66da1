import { describe, expect, it } from 'vitest';
import type { RestrictedRecord, RestrictionOrder } from './standing-restrictions';
import { standingRestrictions } from './standing-restrictions';
import { defaultResistancePolicy as policy } from '../training/resistance-policy';

const today = '2026-12-01';
const none: RestrictedRecord = {
  orders: [],
  events: [],
  dissection: false,
  peripheralArteryDisease: false,
};
const order = (changes: Partial<RestrictionOrder> = {}): RestrictionOrder => ({
  kind: 'lifting',
  limit: 4.5,
  diastolic: null,
  detail: '',
  until: null,
  lifted: false,
  ...changes,
});
const titles = (changes: Partial<RestrictedRecord>) =>
  standingRestrictions({ ...none, ...changes }, today, policy).map(({ title }) => title);

describe('restrictions that hold', () => {
  it.each<[string, Partial<RestrictedRecord>, string[]]>([
    ['none', {}, []],
    ['an order', { orders: [order()] }, ['Lifting limit 4.5 kg']],
    ['its last day', { orders: [order({ until: today })] }, ['Lifting limit 4.5 kg']],
    ['past its last day', { orders: [order({ until: '2026-11-30' })] }, []],
    ['lifted', { orders: [order({ lifted: true })] }, []],
    [
      'a pressure',
      { orders: [order({ kind: 'pressure', limit: 150, diastolic: 90 })] },
      ['Blood-pressure ceiling 150/90 mmHg'],
    ],
    [
      'bypass 11 weeks ago',
      { events: [{ kind: 'bypass', occurredOn: '2026-09-15' }] },
      ['Sternum heals'],
    ],
    ['bypass 12 weeks ago', { events: [{ kind: 'bypass', occurredOn: '2026-09-08' }] }, []],
    [
      'bypass, lifted by the surgeon',
      {
        events: [{ kind: 'bypass', occurredOn: '2026-11-01' }],
        orders: [order({ kind: 'sternum', limit: null, lifted: true })],
      },
      [],
    ],
    [
      'conditions',
      { dissection: true, peripheralArteryDisease: true },
      ['Blood-pressure ceiling', 'Claudication'],
    ],
  ])('%s', (_, record, expected) => expect(titles(record)).toEqual(expected));

  it('say which hold by policy, and an order in its own words', () => {
    const [ordered, byPolicy] = standingRestrictions(
      { ...none, orders: [order({ detail: 'Left arm' })], peripheralArteryDisease: true },
      today,
      policy,
    );
    expect(ordered).toMatchObject({ words: 'Left arm', byPolicy: false });
    expect(byPolicy).toMatchObject({ kind: 'claudication', byPolicy: true });
  });
});
