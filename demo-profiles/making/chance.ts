// Chance that always falls the same way: the demo must come out byte for byte alike wherever it is made.

/** A seeded stream of numbers. */
export class Chance {
  #state: number;

  constructor(seed: number) {
    this.#state = seed >>> 0;
  }

  /** Even in [0, 1): a 32-bit counter, scrambled. */
  next(): number {
    this.#state = (this.#state + 0x9e3779b9) >>> 0;
    let bits = this.#state;
    bits = Math.imul(bits ^ (bits >>> 16), 0x21f0aaad);
    bits = Math.imul(bits ^ (bits >>> 15), 0x735a2d97);
    return ((bits ^ (bits >>> 15)) >>> 0) / 2 ** 32;
  }

  /** Normal, mean 0, deviation 1 (Box & Muller 1958). */
  normal(): number {
    return Math.sqrt(-2 * Math.log(1 - this.next())) * Math.cos(2 * Math.PI * this.next());
  }
}

/**
 * Slow, smooth wandering about zero, deviation about 1: what eddies and waves larger than a gate do to the wind.
 * A few waves of random phase, each with its own period and depth.
 */
export class Wandering {
  readonly #waves: { perHour: number; perKm: number; phase: number }[] = [];

  constructor(chance: Chance, waves = 9) {
    for (let index = 0; index < waves; index++) {
      this.#waves.push({
        perHour: 0.3 * Math.pow(9, index / (waves - 1)),
        perKm: (chance.next() < 0.5 ? -1 : 1) * (0.3 + 2.7 * chance.next()),
        phase: 2 * Math.PI * chance.next(),
      });
    }
  }

  at(heightAgl: number, hours: number): number {
    let sum = 0;
    for (const { perHour, perKm, phase } of this.#waves) {
      sum += Math.cos(2 * Math.PI * (perHour * hours + (perKm * heightAgl) / 1000) + phase);
    }
    return sum * Math.sqrt(2 / this.#waves.length);
  }
}
