/**
 * Stands still until it is moved. It begins in the future, a Monday in 2031, because the job queue stamps new jobs
 * with the database's own time: whatever was queued now is then always due.
 */
export class TestClock {
  private at = new Date('2031-03-03T09:00:00.000Z');

  now(): Date {
    return new Date(this.at);
  }

  set(instant: Date | string): void {
    this.at = new Date(instant);
  }

  advance(by: { days?: number; hours?: number; minutes?: number; seconds?: number }): void {
    const { days = 0, hours = 0, minutes = 0, seconds = 0 } = by;
    this.at = new Date(this.at.getTime() + (((days * 24 + hours) * 60 + minutes) * 60 + seconds) * 1000);
  }
}
