import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { defaultPolicy } from '@shared/clinical/prescribing';
import { prescriptionRequest } from '../../../../test/builders/prescription-request';
import { WorksheetState } from '../worksheet/worksheet-state';
import { TriedChange } from './tried-change';

describe('TriedChange', () => {
  let fixture: ComponentFixture<TriedChange>;
  let loader: HarnessLoader;
  let state: WorksheetState;
  const page = () => fixture.nativeElement as HTMLElement;
  const rows = () =>
    [...page().querySelectorAll('tbody tr')].map((row) =>
      [...row.children].map((cell) => cell.textContent.replace(/\s+/g, ' ').trim()).join(' | '),
    );

  beforeEach(async () => {
    TestBed.configureTestingModule({ providers: [WorksheetState] });
    state = TestBed.inject(WorksheetState);
    const inputs = prescriptionRequest((it) => (it.intensity = null));
    state.start(inputs, defaultPolicy);
    fixture = TestBed.createComponent(TriedChange);
    fixture.componentRef.setInput('record', { inputs, missing: [], origins: {} });
    loader = TestbedHarnessEnvironment.loader(fixture);
    await fixture.whenStable();
  });

  it('says nothing while all is as in the record', () => {
    expect(page().textContent.trim()).toBe('');
  });

  it('shows the range by the record and as tried, and leads back', async () => {
    state.form.controls.resting.controls.seated.setValue(70);
    await fixture.whenStable();
    expect(page().textContent).toContain('Not as in the record: resting rate.');
    expect(rows()).toContainEqual(
      expect.stringMatching(/^Target \| 91–108 bpm \| 96–108 bpm \| .*changed$/),
    );
    expect(rows()).toContain('Ceiling | 108 bpm | 108 bpm | same');
    await (await loader.getHarness(MatButtonHarness.with({ text: 'Back to the record' }))).click();
    expect(state.request()?.resting.seated).toBe(62);
    expect(page().textContent.trim()).toBe('');
  });
});
