import { TestBed } from '@angular/core/testing';
import { PulseTimer } from './pulse-timer';

describe('PulseTimer', () => {
  beforeEach(() => {
    vi.useFakeTimers();
  });
  afterEach(() => {
    vi.useRealTimers();
  });

  async function open() {
    const fixture = TestBed.createComponent(PulseTimer);
    fixture.componentRef.setInput('count', { lower: 16, upper: 17 });
    fixture.detectChanges();
    const element = fixture.nativeElement as HTMLElement;
    const pass = async (ms: number) => {
      await vi.advanceTimersByTimeAsync(ms);
      fixture.detectChanges();
    };
    const press = (words: string) => {
      [...element.querySelectorAll('button')]
        .find((button) => button.textContent.includes(words))
        ?.click();
      fixture.detectChanges();
    };
    const type = (beats: string) => {
      const input = element.querySelector('input');
      if (!input) throw new Error('There is nothing to type into');
      input.value = beats;
      input.dispatchEvent(new Event('input'));
      fixture.detectChanges();
    };
    await pass(0);
    return { text: () => element.textContent.replace(/\s+/g, ' '), pass, press, type, fixture };
  }

  it('counts ten seconds in numbers, then says stop, on the screen and to a screen reader', async () => {
    const timer = await open();
    timer.press('Start');
    expect(timer.text()).toContain('10seconds left');
    expect(timer.text()).toContain('Count now.');
    await timer.pass(9000);
    expect(timer.text()).toContain('1seconds left');
    await timer.pass(1100);
    expect(timer.text()).toContain('Stop counting.');
    expect(timer.text()).toContain('How many beats?');
  });

  it.each([
    ['15', 'Below your range'],
    ['16', 'In your range'],
    ['17', 'In your range'],
    ['18', 'Above your range. Slow down'],
  ])('says of %s beats: %s', async (beats, words) => {
    const timer = await open();
    timer.press('Start');
    await timer.pass(10_100);
    timer.type(beats);
    expect(timer.text()).toContain(words);
    timer.type('x');
    expect(timer.text()).not.toContain('your range');
  });

  it('begins anew, and stops with the page', async () => {
    const timer = await open();
    timer.press('Start');
    await timer.pass(10_100);
    timer.press('Count again');
    expect(timer.text()).toContain('10seconds left');
    const cleared = vi.spyOn(globalThis, 'clearInterval');
    timer.fixture.destroy();
    expect(cleared).toHaveBeenCalledOnce();
    cleared.mockRestore();
  });
});
