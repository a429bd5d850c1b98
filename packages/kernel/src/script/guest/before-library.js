// Runs in the sandbox before the maths library is loaded: no clock and no chance of the machine's may get into the
// snapshot. The library asks for both while it loads.
(() => {
  const MachineDate = Date;
  const zero = () => 0;
  const FixedDate = function (...given) {
    const values = given.length === 0 ? [0] : given;
    return new.target === undefined
      ? new MachineDate(0).toString()
      : Reflect.construct(MachineDate, values, new.target);
  };
  FixedDate.prototype = MachineDate.prototype;
  FixedDate.prototype.constructor = FixedDate;
  FixedDate.now = zero;
  FixedDate.parse = MachineDate.parse;
  FixedDate.UTC = MachineDate.UTC;
  globalThis.Date = FixedDate;
  Math.random = () => 0.5;
})();
