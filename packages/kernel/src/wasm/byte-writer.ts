/** A growing byte buffer that writes the number encodings of the WebAssembly binary format (LEB128 and IEEE 754). */
export class ByteWriter {
  private bytes: Uint8Array<ArrayBuffer>;
  private view: DataView;
  private used = 0;

  constructor(capacity = 256) {
    this.bytes = new Uint8Array(capacity);
    this.view = new DataView(this.bytes.buffer);
  }

  get length(): number {
    return this.used;
  }

  byte(value: number): void {
    if (this.used === this.bytes.length) this.grow(1);
    this.bytes[this.used++] = value;
  }

  /** An unsigned integer below 2^32. */
  unsigned(value: number): void {
    let rest = value;
    for (; rest >= 128; rest = Math.floor(rest / 128)) this.byte((rest % 128) | 128);
    this.byte(rest);
  }

  /** An instruction with one unsigned operand: most of what is written, hence without further calls where it is short. */
  instruction(code: number, operand: number): void {
    if (operand >= 128 || this.used + 2 > this.bytes.length) {
      this.byte(code);
      this.unsigned(operand);
      return;
    }
    this.bytes[this.used] = code;
    this.bytes[this.used + 1] = operand;
    this.used += 2;
  }

  /** A signed 32-bit integer. */
  signed(value: number): void {
    let rest = value | 0;
    for (;;) {
      const low = rest & 127;
      rest >>= 7;
      const last = (rest === 0 && (low & 64) === 0) || (rest === -1 && (low & 64) !== 0);
      this.byte(last ? low : low | 128);
      if (last) return;
    }
  }

  float64(value: number): void {
    if (this.used + 8 > this.bytes.length) this.grow(8);
    this.view.setFloat64(this.used, value, true);
    this.used += 8;
  }

  /** A length-prefixed name; ASCII only. */
  name(text: string): void {
    this.unsigned(text.length);
    for (let i = 0; i < text.length; i++) this.byte(text.charCodeAt(i));
  }

  append(other: ByteWriter): void {
    if (this.used + other.used > this.bytes.length) this.grow(other.used);
    this.bytes.set(other.bytes.subarray(0, other.used), this.used);
    this.used += other.used;
  }

  /** `other` with its length in front. */
  sized(other: ByteWriter): void {
    this.unsigned(other.used);
    this.append(other);
  }

  finish(): Uint8Array<ArrayBuffer> {
    return this.bytes.slice(0, this.used);
  }

  private grow(extra: number): void {
    const larger = new Uint8Array(Math.max(this.bytes.length * 2, this.used + extra));
    larger.set(this.bytes.subarray(0, this.used));
    this.bytes = larger;
    this.view = new DataView(larger.buffer);
  }
}
