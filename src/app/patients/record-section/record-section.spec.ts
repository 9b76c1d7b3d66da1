import type { HarnessLoader } from '@angular/cdk/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { provideHttpClient, withInterceptors } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { type ComponentFixture, TestBed } from '@angular/core/testing';
import { MatButtonHarness } from '@angular/material/button/testing';
import { MatFormFieldHarness } from '@angular/material/form-field/testing';
import { MatInputHarness, MatNativeSelectHarness } from '@angular/material/input/testing';
import { MatSnackBarHarness } from '@angular/material/snack-bar/testing';
import { type PatientRecord, recordKinds } from '@shared/contracts/record-contract';
import { problemInterceptor } from '../../core/problem-interceptor';
import { PatientChart } from '../patient-chart';
import { PatientsClient } from '../patients-client';
import { RecordSection } from './record-section';
import type { ListedKind } from './section-words';

const patientId = '019ae2f0-7e55-7000-8000-000000000100';
const batch = `/api/patients/${patientId}/record`;
const person = { id: '019ae2f0-7e55-7000-8000-000000000001', displayName: 'Ines Calder' };

const entry = (values: object, given: object = {}) => ({
  id: '019ae2f0-7e55-7000-8000-000000000201',
  values,
  recordedAt: '2026-11-20T15:00:00Z',
  recordedBy: person,
  enteredInErrorAt: null,
  enteredInErrorBy: null,
  ended: null,
  ...given,
});

const recordWith = (kinds: object): PatientRecord => ({
  ...(Object.fromEntries(recordKinds.map((kind) => [kind, []])) as unknown as PatientRecord),
  ...kinds,
});

const drug = {
  name: 'Metoprolol tartrate',
  salt: null,
  flags: [],
  times: [],
  rateActing: 'beta-blocker',
  dose: '50 mg',
  schedule: 'twice a day',
  startedOn: '2026-09-04',
  stoppedOn: null,
  replaces: null,
};

describe('RecordSection', () => {
  let fixture: ComponentFixture<RecordSection>;
  let loader: HarnessLoader;
  let server: HttpTestingController;

  beforeEach(() => {
    localStorage.clear();
    TestBed.configureTestingModule({
      providers: [
        provideHttpClient(withInterceptors([problemInterceptor])),
        provideHttpClientTesting(),
        PatientChart,
      ],
    });
    server = TestBed.inject(HttpTestingController);
    // The head of the page is not looked at here, and would keep the page busy for as long as it is not answered.
    vi.spyOn(TestBed.inject(PatientsClient), 'patient').mockReturnValue({
      reload: () => true,
    } as ReturnType<PatientsClient['patient']>);
  });

  async function open(kind: ListedKind, record = recordWith({})): Promise<void> {
    TestBed.inject(PatientChart).id.set(patientId);
    fixture = TestBed.createComponent(RecordSection);
    fixture.componentRef.setInput('kind', kind);
    fixture.componentRef.setInput('record', record);
    fixture.componentRef.setInput('today', '2026-12-01');
    fixture.componentRef.setInput('timeZone', 'America/New_York');
    loader = TestbedHarnessEnvironment.loader(fixture);
    document.body.append(fixture.nativeElement as HTMLElement);
    await fixture.whenStable();
  }
  afterEach(() => {
    fixture.destroy();
  });

  async function press(text: string | RegExp): Promise<void> {
    await (await loader.getHarness(MatButtonHarness.with({ text }))).click();
  }

  async function type(label: string, value: string): Promise<void> {
    const field = await loader.getHarness(MatFormFieldHarness.with({ floatingLabelText: label }));
    const input = await field.getControl(MatInputHarness);
    if (input) await input.setValue(value);
    else await (await field.getControl(MatNativeSelectHarness))?.selectOptions({ text: value });
  }

  async function errors(): Promise<string[]> {
    const fields = await loader.getAllHarnesses(MatFormFieldHarness);
    return (await Promise.all(fields.map((field) => field.getTextErrors()))).flat();
  }

  const sent = () => vi.waitFor(() => server.expectOne(batch));
  const text = () => (fixture.nativeElement as HTMLElement).textContent.replace(/\s+/g, ' ');

  it('says what is missing, and puts the first field under the fingers', async () => {
    await open('resting-rates');
    expect(text()).toContain('No resting rate entered. A range needs one.');
    await press(/Add a resting rate/);
    await fixture.whenStable();
    expect(document.activeElement?.closest('mat-form-field')?.textContent).toContain('Seated');
  });

  it('tells faults beside their fields before anything is sent, and keeps what was typed', async () => {
    await open('resting-rates');
    await press(/Add a resting rate/);
    await type('Seated', '25');
    await type('Standing', '70');
    await press('Save');
    expect(await errors()).toEqual(['Enter 30 to 130 bpm']);
    server.expectNone(batch);
    expect((fixture.nativeElement as HTMLElement).querySelectorAll('input')[1]?.value).toBe('70');
  });

  it('sends numbers in the contract’s unit, dated today, under an id of its own', async () => {
    await open('body-measurements');
    await press(/Add weight or height/);
    await type('Weight', '185');
    await type('Height', '5 10');
    await press('Save');
    const { request } = await sent();
    expect(request.body).toEqual({
      entries: [
        {
          kind: 'body-measurements',
          id: expect.stringMatching(/^[0-9a-f-]{36}$/),
          values: {
            weightKg: expect.closeTo(83.9146, 3),
            heightCm: 177.8,
            measuredOn: '2026-12-01',
          },
        },
      ],
    });
  });

  it('holds several fields against each other', async () => {
    await open('body-measurements');
    await press(/Add weight or height/);
    await press('Save');
    expect(await errors()).toEqual(['Enter a weight or a height']);
    server.expectNone(batch);
  });

  it('shows the server’s faults at the fields they are of, and sends again under the same id', async () => {
    await open('exercise-tests');
    await press(/Add an exercise test/);
    await type('Mode', 'Treadmill');
    await type('Protocol', 'Bruce');
    await type('Ended by', 'Fatigue');
    await type('Peak heart rate', '134');
    await press(/Add what was found/);
    await type('What began', 'Ischemia (ST change)');
    await type('At a heart rate of', '118');
    await press('Save the test');
    const first = await sent();
    const [test, threshold] = first.request.body.entries;
    expect(threshold.values).toMatchObject({
      kind: 'ischemia',
      heartRate: 118,
      exerciseTestId: test.id,
      foundOn: '2026-12-01',
    });
    first.flush(
      {
        type: '/problems/invalid-request',
        title: 'Some of what was entered is not valid.',
        status: 422,
        code: 'invalid-request',
        id: 'abc',
        errors: [
          {
            path: 'entries.0.values.performedOn',
            code: 'future',
            message: 'Enter a date up to today',
          },
          { path: 'entries.1.values.heartRate', code: 'x', message: 'Look at this rate' },
        ],
      },
      { status: 422, statusText: 'No' },
    );
    await vi.waitFor(async () => {
      expect(await errors()).toEqual(['Enter a date up to today', 'Look at this rate']);
    });
    await press('Save the test');
    const again = await sent();
    expect(again.request.body.entries[0].id).toBe(test.id);
  });

  it('says what was saved, and takes it back the last first', async () => {
    await open('resting-rates');
    await press(/Add a resting rate/);
    await type('Seated', '62');
    await press('Save');
    const saved = await sent();
    const { id, values } = saved.request.body.entries[0];
    saved.flush({ entries: [entry(values, { id })] });
    const page = TestbedHarnessEnvironment.documentRootLoader(fixture);
    const notice = await vi.waitFor(() => page.getHarness(MatSnackBarHarness));
    expect(await notice.getMessage()).toBe('Resting rate saved.');
    await notice.dismissWithAction();
    await vi.waitFor(() => server.expectOne(`${batch}/resting-rates/${id}/entered-in-error`));
  });

  it('changes a dose by a new entry that names the former', async () => {
    await open('medications', recordWith({ medications: [entry(drug)] }));
    expect(text()).toContain('Metoprolol tartrate 50 mg');
    (fixture.nativeElement as HTMLElement).querySelector<HTMLElement>('[aria-expanded]')?.click();
    await press('Change the dose');
    await type('Dose', '100 mg');
    await press('Save the change');
    const { request } = await sent();
    expect(request.body.entries[0].values).toEqual({
      ...drug,
      dose: '100 mg',
      startedOn: '2026-12-01',
      stoppedOn: undefined,
      replaces: entry(drug).id,
    });
  });

  it('asks before an entry is marked as in error', async () => {
    await open('medications', recordWith({ medications: [entry(drug)] }));
    (fixture.nativeElement as HTMLElement).querySelector<HTMLElement>('[aria-expanded]')?.click();
    await press('Entered in error');
    expect(text()).toContain('It no longer counts, and stays to be read.');
    await press('Mark as entered in error');
    server.expectOne(`${batch}/medications/${entry(drug).id}/entered-in-error`);
  });

  it('keeps entries in error out of sight, and shows them when asked', async () => {
    const wrong = entry(drug, {
      enteredInErrorAt: '2026-11-21T15:00:00Z',
      enteredInErrorBy: person,
    });
    await open('medications', recordWith({ medications: [wrong] }));
    expect(text()).not.toContain('Metoprolol');
    await press(/Show entries in error \(1\)/);
    expect(text()).toContain('Entered in error');
    expect(text()).toContain('taken back by Ines Calder on Nov 21, 2026');
  });
});
