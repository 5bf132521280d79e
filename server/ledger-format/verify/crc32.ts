/** CRC-32 of zip files (ISO 3309), eight tables at a time so that large raw files do not wait for it. */
const tables = Array.from({ length: 8 }, () => new Uint32Array(256))

for (let n = 0; n < 256; n++) {
  let c = n
  for (let bit = 0; bit < 8; bit++) c = c & 1 ? (c >>> 1) ^ 0xedb88320 : c >>> 1
  ;(tables[0] as Uint32Array)[n] = c
}
for (let t = 1; t < 8; t++) {
  for (let n = 0; n < 256; n++) {
    const c = tables[t - 1]?.[n] ?? 0
    ;(tables[t] as Uint32Array)[n] = (c >>> 8) ^ (tables[0]?.[c & 255] ?? 0)
  }
}
const [t0, t1, t2, t3, t4, t5, t6, t7] = tables as [
  Uint32Array,
  Uint32Array,
  Uint32Array,
  Uint32Array,
  Uint32Array,
  Uint32Array,
  Uint32Array,
  Uint32Array,
]

export class Crc32 {
  private state = 0xffffffff

  get value(): number {
    return ~this.state >>> 0
  }

  update(bytes: Uint8Array): void {
    let c = this.state
    let i = 0
    // Indexes below are within their arrays by construction; the assertions only satisfy the compiler.
    for (; i + 8 <= bytes.length; i += 8) {
      const low = c ^ (bytes[i]! | (bytes[i + 1]! << 8) | (bytes[i + 2]! << 16) | (bytes[i + 3]! << 24))
      c =
        t7[low & 255]! ^
        t6[(low >>> 8) & 255]! ^
        t5[(low >>> 16) & 255]! ^
        t4[low >>> 24]! ^
        t3[bytes[i + 4]!]! ^
        t2[bytes[i + 5]!]! ^
        t1[bytes[i + 6]!]! ^
        t0[bytes[i + 7]!]!
    }
    for (; i < bytes.length; i++) c = (c >>> 8) ^ t0[(c ^ bytes[i]!) & 255]!
    this.state = c
  }
}
