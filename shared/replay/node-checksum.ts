import type { CarrierNodes } from '../fixed-point/datapath/carrier-nodes';

/** Running 64-bit checksum over z, e, acc, acc2, w and phase of every symbol, in two lanes of 32 bits. */
export class NodeChecksum {
  private a = 0x243f6a88;
  private b = 0x85a308d3;

  add({ zI, zQ, e, accLow, acc2Low, wLow, phaseLow }: CarrierNodes, count: number): void {
    let { a, b } = this;
    for (let k = 0; k < count; k++) {
      a = Math.imul(a ^ zI[k]!, 0x9e3779b1);
      b = Math.imul(b ^ zQ[k]!, 0x85ebca77);
      a = Math.imul((a ^ (a >>> 15)) + e[k]!, 0xc2b2ae3d);
      b = Math.imul((b ^ (b >>> 13)) + accLow[k]!, 0x27d4eb2f);
      a = Math.imul(a ^ (a >>> 16) ^ wLow[k]!, 0x165667b1);
      b = Math.imul(b ^ (b >>> 15) ^ phaseLow[k]! ^ acc2Low[k]!, 0x9e3779b1);
      b ^= a >>> 11;
      a = (a + b) | 0;
    }
    this.a = a;
    this.b = b;
  }

  /** Sixteen hexadecimal digits. */
  digits(): string {
    return [this.a, this.b].map((lane) => (lane >>> 0).toString(16).padStart(8, '0')).join('');
  }
}
