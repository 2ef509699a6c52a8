import type { ArrivalEstimate } from "#lib/core/arrival/estimate.ts";
import { lineAtFrequency, shortenedBy } from "#lib/core/arrival/line-at-frequency.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import { dayWords } from "./times.ts";

export interface PlotSize {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export interface PlotDot {
  readonly row: number;
  readonly x: number;
  readonly y: number;
  /** The ends of its errors, 1 sigma. */
  readonly x1: number;
  readonly x2: number;
  readonly y1: number;
  readonly y2: number;
}

/** Readings and their line in pixels: time to the right, frequency upwards, so that long periods lie below. */
export interface LinePlot {
  readonly dots: readonly PlotDot[];
  /** Paths as SVG writes them; empty where there is no line. */
  readonly line: string;
  readonly spread: string;
  /** The line as the readings gave it before the correction for periods timed at a moment; empty where that is small. */
  readonly asRead: string;
  readonly times: readonly { readonly x: number; readonly label: string; readonly day: string }[];
  readonly periods: readonly { readonly y: number; readonly label: string }[];
}

const HOUR = 3600;
const TIME_STEPS_HOURS = [0.25, 0.5, 1, 2, 3, 6, 12, 24, 48, 96, 240, 720];
const PERIODS = [40, 30, 25, 22, 20, 18, 17, 16, 15, 14, 13, 12, 11, 10, 9, 8, 7, 6, 5, 4, 3, 2];
const LABEL_PIXELS = 62;
const PERIOD_PIXELS = 19;
const LINE_STEPS = 24;

interface Scales {
  readonly x: (epochSeconds: number) => number;
  readonly y: (frequencyHz: number) => number;
  readonly lowHz: number;
  readonly highHz: number;
  readonly first: number;
  readonly last: number;
}

/** Null where there is no reading. */
export function linePlot(drawing: { readings: readonly Reading[]; estimate: ArrivalEstimate | null; settings: EstimationSettings; size: PlotSize }): LinePlot | null {
  const { readings, estimate, settings, size } = drawing;
  if (readings.length === 0) return null;
  const scales = scalesOf(readings, size);
  return {
    dots: readings.map((reading) => dotOf(reading, scales)),
    ...(estimate === null ? { line: "", spread: "", asRead: "" } : linesOf(estimate, readings, settings, scales)),
    times: timeTicks(scales, size),
    periods: periodTicks(scales),
  };
}

function scalesOf(readings: readonly Reading[], size: PlotSize): Scales {
  const times = readings.map(({ arrivalEpochSeconds }) => arrivalEpochSeconds);
  const frequencies = readings.map(({ frequencyHz }) => frequencyHz);
  const [first, last] = padded(Math.min(...times), Math.max(...times), 2 * HOUR);
  const [lowHz, highHz] = padded(Math.min(...frequencies), Math.max(...frequencies), 0.006);
  const x = (time: number): number => size.left + ((time - first) / (last - first)) * (size.width - size.left - size.right);
  const y = (hz: number): number => size.height - size.bottom - ((hz - lowHz) / (highHz - lowHz)) * (size.height - size.top - size.bottom);
  return { x, y, lowHz, highHz, first, last };
}

/** A little air on both sides, and no less between the ends than `least`. */
function padded(from: number, to: number, least: number): readonly [number, number] {
  const air = 0.12 * Math.max(to - from, least);
  const middle = (from + to) / 2;
  const half = Math.max(to - from, least) / 2 + air;
  return [middle - half, middle + half];
}

function dotOf({ row, arrivalEpochSeconds: time, arrivalSigmaSeconds, frequencyHz, frequencySigmaHz }: Reading, { x, y }: Scales): PlotDot {
  return {
    row,
    ...{ x: x(time), x1: x(time - arrivalSigmaSeconds), x2: x(time + arrivalSigmaSeconds) },
    ...{ y: y(frequencyHz), y1: y(frequencyHz - frequencySigmaHz), y2: y(frequencyHz + frequencySigmaHz) },
  };
}

function linesOf(estimate: ArrivalEstimate, readings: readonly Reading[], settings: EstimationSettings, scales: Scales): Pick<LinePlot, "line" | "spread" | "asRead"> {
  const { gravity, timed } = settings;
  const frequencies = Array.from({ length: LINE_STEPS + 1 }, (_, i) => scales.lowHz + (i / LINE_STEPS) * (scales.highHz - scales.lowHz));
  const moments = frequencies.map((hz) => ({ hz, ...lineAtFrequency(estimate, hz, gravity) }));
  const early = moments.map(({ hz, arrivalEpochSeconds, sigmaSeconds }) => pointAt(scales, arrivalEpochSeconds - sigmaSeconds, hz));
  const late = moments.map(({ hz, arrivalEpochSeconds, sigmaSeconds }) => pointAt(scales, arrivalEpochSeconds + sigmaSeconds, hz));
  const stretch = 1 + shortenedBy(estimate, { gravity, ...timed });
  const pivotHz = readings.reduce((sum, { frequencyHz }) => sum + frequencyHz / readings.length, 0);
  const asRead = frequencies.map((hz) => pointAt(scales, lineAtFrequency(estimate, pivotHz + (hz - pivotHz) * stretch, gravity).arrivalEpochSeconds, hz));
  return {
    line: `M${moments.map(({ hz, arrivalEpochSeconds }) => pointAt(scales, arrivalEpochSeconds, hz)).join("L")}`,
    spread: `M${[...early, ...late.reverse()].join("L")}Z`,
    asRead: stretch < 1.05 ? "" : `M${asRead.join("L")}`,
  };
}

function pointAt({ x, y }: Scales, epochSeconds: number, hz: number): string {
  return `${x(epochSeconds).toFixed(1)} ${y(hz).toFixed(1)}`;
}

const MONTH_HOURS = 720;

function timeTicks({ first, last, x }: Scales, { width, left, right }: PlotSize): LinePlot["times"] {
  const most = Math.max(2, Math.floor((width - left - right) / LABEL_PIXELS));
  // A slip of the year makes years of it: months then, as many as leave the labels room.
  const months = Math.ceil((last - first) / (most * MONTH_HOURS * HOUR));
  const step = HOUR * (TIME_STEPS_HOURS.find((hours) => (last - first) / (hours * HOUR) <= most) ?? MONTH_HOURS * months);
  const ticks: { x: number; label: string; day: string }[] = [];
  for (let time = Math.ceil(first / step) * step; time <= last; time += step) {
    const day = step > MONTH_HOURS * HOUR ? dayWords(time) : dayWords(time).replace(/ \d+$/, "");
    const clock = new Date(time * 1000).toISOString().slice(11, 16);
    const isNewDay = ticks.every((tick) => tick.day !== day);
    ticks.push({ x: x(time), label: clock, day: isNewDay ? day : "" });
  }
  return ticks;
}

function periodTicks({ lowHz, highHz, y }: Scales): LinePlot["periods"] {
  const ticks: { y: number; label: string }[] = [];
  for (const period of PERIODS) {
    const hz = 1 / period;
    const above = ticks.at(-1);
    if (hz >= lowHz && hz <= highHz && (above === undefined || above.y - y(hz) >= PERIOD_PIXELS)) ticks.push({ y: y(hz), label: String(period) });
  }
  return ticks;
}
