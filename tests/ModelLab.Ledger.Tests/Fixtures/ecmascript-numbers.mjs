// Makes ecmascript-numbers.csv: doubles by their bits, and the text JSON.stringify gives them.
// Run with Node.js: node ecmascript-numbers.mjs > ecmascript-numbers.csv   (the file at hand: v20.20.2)
const view = new DataView(new ArrayBuffer(8));
let state = 0x9e3779b97f4a7c15n;
const next = () => {
  // splitmix64, so that the file can be made again
  state = (state + 0x9e3779b97f4a7c15n) & 0xffffffffffffffffn;
  let z = state;
  z = ((z ^ (z >> 30n)) * 0xbf58476d1ce4e5b9n) & 0xffffffffffffffffn;
  z = ((z ^ (z >> 27n)) * 0x94d049bb133111ebn) & 0xffffffffffffffffn;
  return z ^ (z >> 31n);
};
const ofBits = (bits) => (view.setBigUint64(0, bits), view.getFloat64(0));
const toBits = (value) => (view.setFloat64(0, value), view.getBigUint64(0));
const lines = [];
const add = (bits) => {
  const value = ofBits(bits);
  if (Number.isFinite(value)) lines.push(`${bits.toString(16).padStart(16, "0")},${JSON.stringify(value)}`);
};
for (let i = 0; i < 1000; i++) add(next()); // all magnitudes alike
for (let i = 0; i < 1000; i++) add(toBits((Number(next() >> 11n) / 2 ** 53) * 10 ** (Number(next() % 44n) - 20))); // magnitudes as met in figures
for (let i = 0; i < 200; i++) add(next() & 0x800fffffffffffffn); // subnormal
for (let e = -324; e <= 308; e++) for (const d of [-1n, 0n, 1n]) if (toBits(Number(`1e${e}`)) + d >= 0n) add(toBits(Number(`1e${e}`)) + d);
for (let e = 0n; e < 2047n; e += 8n) for (const d of [0n, 1n, 0xfffffffffffffn]) add((e << 52n) | d);
for (let i = 0; i < 200; i++) add(toBits(Number(next() % 2000000n) / 100 - 10000)); // decimals as typed
process.stdout.write(lines.join("\n") + "\n");
