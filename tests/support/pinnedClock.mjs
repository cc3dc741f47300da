/**
 * Puts the clock of a process to the morning that the demo desk was laid out for, from where it runs on: what the
 * product says of days is then the same whenever the tests run. Preloaded into the product's processes and into the
 * tests that speak with them.
 */
const offset = Number(process.env.CLOCK_OFFSET_MS ?? '');
if (!Number.isFinite(offset)) throw new Error('CLOCK_OFFSET_MS is no number');

const MachineDate = Date;

globalThis.Date = class Date extends MachineDate {
  constructor(...given) {
    if (given.length === 0) super(MachineDate.now() + offset);
    else super(...given);
  }

  // What Node itself makes (of a file, out of a message) is a date as well.
  static [Symbol.hasInstance](value) {
    return Function.prototype[Symbol.hasInstance].call(MachineDate, value);
  }

  static now() {
    return MachineDate.now() + offset;
  }
};
