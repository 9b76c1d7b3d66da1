import { TestBed } from '@angular/core/testing';
import { defaultPolicy } from '@shared/clinical/prescribing';
import {
  answerTo,
  type Change,
  withoutThresholds,
} from '../../../../test/builders/prescription-request';
import { WorkloadsTable } from './workloads-table';

describe('WorkloadsTable', () => {
  async function show(changes: Change[], policy = defaultPolicy) {
    const fixture = TestBed.createComponent(WorkloadsTable);
    fixture.componentRef.setInput('answer', answerTo(changes));
    fixture.componentRef.setInput('policy', policy);
    await fixture.whenStable();
    const page = fixture.nativeElement as HTMLElement;
    return {
      text: () => page.textContent.replace(/\s+/g, ' '),
      gaits: () => [...page.querySelectorAll<HTMLInputElement>('input[type="radio"]')],
      settle: () => fixture.whenStable(),
    };
  }

  it('shows where each equation was validated, the handrail note and the steps of the policy', async () => {
    const table = await show([]);
    expect(table.text()).toContain('3.5 + 0.1 S + 1.8 S G, validated: 50–100 m/min.');
    expect(table.text()).toContain('validated: 50–200 W.');
    expect(table.text()).toContain('Holding the handrail makes the work lighter');
    expect(table.text()).toContain('steps of 0.1 mph and 0.5 % on the treadmill');
    expect(table.text()).toContain('(policy 1)');
  });

  it('sets a run where somebody is seen to run, and says why where that is too slow', async () => {
    const table = await show([withoutThresholds]);
    expect(table.gaits().map(({ value, checked }) => [value, checked])).toEqual([
      ['walk', true],
      ['run', false],
    ]);
    table.gaits()[1]?.click();
    await table.settle();
    expect(table.text()).toContain('Treadmill, running');
    expect(table.text()).toContain('walk instead');
    table.gaits()[0]?.click();
    await table.settle();
    expect(table.text()).not.toContain('Treadmill, running');
  });

  it('offers no run to a range of another version of the policy', async () => {
    const table = await show([], { ...defaultPolicy, version: 2 });
    expect(table.gaits()).toEqual([]);
    expect(table.text()).not.toContain('Rounded down');
  });
});
