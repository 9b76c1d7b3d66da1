import { ErrorHandler } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { TestbedHarnessEnvironment } from '@angular/cdk/testing/testbed';
import { MatSnackBarHarness } from '@angular/material/snack-bar/testing';
import { PageHeader } from '../ui/page-header/page-header';
import { AppErrorHandler } from './app-error-handler';
import { Notices } from './notices';
import { Problem } from './problem';

function snackBar(): Promise<MatSnackBarHarness> {
  const fixture = TestBed.createComponent(PageHeader);
  fixture.componentRef.setInput('heading', 'Any page');
  return TestbedHarnessEnvironment.documentRootLoader(fixture).getHarness(MatSnackBarHarness);
}

describe('AppErrorHandler', () => {
  beforeEach(() => {
    TestBed.configureTestingModule({
      providers: [{ provide: ErrorHandler, useClass: AppErrorHandler }],
    });
  });

  it('tells a problem that no page caught, with its reference, and logs it', async () => {
    const log = vi.spyOn(console, 'error').mockReturnValue(undefined);
    const problem = new Problem('unavailable', 'The database does not answer.', 503, 'abc');
    TestBed.inject(ErrorHandler).handleError(problem);
    await vi.waitFor(async () => {
      const message = await (await snackBar()).getMessage();
      expect(message).toBe('The database does not answer. Reference abc');
    });
    expect(log).toHaveBeenCalledWith(problem);
    log.mockRestore();
  });
});

describe('Notices', () => {
  it('offers to undo', async () => {
    const undo = vi.fn();
    await TestBed.inject(Notices).offerUndo('Class cancelled', undo);
    const bar = await snackBar();
    expect(await bar.getMessage()).toBe('Class cancelled');
    await bar.dismissWithAction();
    expect(undo).toHaveBeenCalledOnce();
  });
});
