/**
 * Moving, plausible signals of the demo's rope braiders (all invented), as functions of time: the carriage runs to and
 * fro, the creel empties and is refilled, the gearbox warms up, braider 4 waits now and then.
 */

export type BraiderSignals = {
  /** mm */
  readonly creelDistance: number;
  /** mm */
  readonly carriagePosition: number;
  readonly carriageSetpoint: number;
  /** r/min */
  readonly spindleSpeed: number;
  readonly picks: number;
  /** mm/s, °C, %, hPa */
  readonly vibration: number;
  readonly temperature: number;
  readonly humidity: number;
  readonly pressure: number;
  /** 0 Off, 1 Setup, 2 Running, 3 Waiting, 4 Fault */
  readonly state: number;
  readonly faultNumber: number;
  readonly recipeNumber: number;
  /** kW, kW·h, V, A */
  readonly activePower: number;
  readonly activeEnergy: number;
  readonly voltage: number;
  readonly current: number;
  readonly powerFactor: number;
  /** The creel sensor hears no echo for a second each minute. */
  readonly hasEcho: boolean;
};

const CREEL_EMPTY_MM = 380;
const CREEL_FULL_MM = 60;
const CREEL_MINUTES = 25;

/** The signals of braider 1 … 6 at a time in milliseconds. */
export function makeBraiderSignals(braider: number, time: number): BraiderSignals {
  const seconds = time / 1000 + braider * 37;
  const isWaiting = braider === 4 && seconds % 180 < 25;
  const isRunning = !isWaiting;
  const stroke = triangle(seconds / 90);
  const setpoint = 20 + 210 * stroke;
  const lag = 0.6 * Math.sin(seconds * 1.7 + braider);
  const speed = isRunning ? 120 + 8 * braider + 3 * Math.sin(seconds / 9) : 0;
  const power = isRunning ? 3.1 + 0.25 * braider + 0.4 * Math.sin(seconds / 5) : 0.35;
  const used = (seconds / (CREEL_MINUTES * 60)) % 1;
  return {
    creelDistance: CREEL_FULL_MM + (CREEL_EMPTY_MM - CREEL_FULL_MM) * used,
    carriagePosition: setpoint + (isRunning ? lag : 0),
    carriageSetpoint: setpoint,
    spindleSpeed: speed,
    picks: Math.floor(seconds * 4.2) % 4_294_967_296,
    vibration: isRunning ? 2.1 + 0.2 * braider + 0.5 * Math.abs(Math.sin(seconds / 3)) : 0.1,
    temperature: 52 + 2 * braider + 4 * Math.sin(seconds / 200),
    humidity: 47 + 5 * Math.sin(seconds / 400),
    pressure: 1009 + 4 * Math.sin(seconds / 900),
    state: isWaiting ? 3 : 2,
    faultNumber: isWaiting ? 12 : 0,
    recipeNumber: 10 + braider,
    activePower: power,
    activeEnergy: 4_800 + 140 * braider + (seconds % 1_000_000) * 0.001,
    voltage: 230 + 1.5 * Math.sin(seconds / 30),
    current: (power * 1000) / 230 / 0.86,
    powerFactor: 0.86 + 0.02 * Math.sin(seconds / 11),
    hasEcho: seconds % 60 > 1,
  };
}

function triangle(turns: number): number {
  const phase = turns - Math.floor(turns);
  return phase < 0.5 ? 2 * phase : 2 - 2 * phase;
}

function word(value: number): readonly [number, number] {
  const bits = Math.round(value) & 0xffff;
  return [bits >> 8, bits & 0xff];
}

/** QS-U30: distance 0.1 mm @16, scale −4 @8, SSC1 @0 (nearer than 100 mm). */
export function encodeCreelSensor(s: BraiderSignals): number[] {
  const raw = s.hasEcho ? s.creelDistance * 10 : 32_764;
  return [...word(raw), 0xfc, s.creelDistance < 100 ? 1 : 0];
}

/** QS-P12: position 0.01 mm @16, scale −5 @8, SSC1 @0 (beyond 200 mm). */
export function encodeCarriageSensor(s: BraiderSignals): number[] {
  return [...word(s.carriagePosition * 100), 0xfb, s.carriagePosition > 200 ? 1 : 0];
}

/** QS-C04: vibration @80, temperature @64, humidity @56, pressure @40, spare @8, alarms @0. */
export function encodeConditionMonitor(s: BraiderSignals): number[] {
  return [
    ...word(s.vibration * 100),
    ...word(s.temperature * 10),
    Math.round(s.humidity * 2),
    ...word(s.pressure * 10),
    0,
    0,
    0,
    0,
    s.vibration > 4 ? 1 : 0,
  ];
}

/** QS-L5, set data: the lowest segment green while running, the third yellow while waiting. */
export function encodeStackLight(s: BraiderSignals): number[] {
  const segment = (colour: number, pattern: number): number => (colour << 5) | (pattern << 2) | 3;
  return [s.state === 2 ? segment(1, 0) : 0, 0, s.state === 3 ? segment(2, 2) : 0, 0, 0];
}
