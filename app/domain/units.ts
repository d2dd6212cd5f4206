declare const unit: unique symbol;
type In<Name extends string> = number & { readonly [unit]: Name };

/** A weight in pounds (avoirdupois). */
export type Lb = In<"lb">;
/** Material leaving a spreader, pounds a minute. */
export type LbPerMin = In<"lb/min">;
/** Ground speed, miles an hour. */
export type Mph = In<"mph">;
/** Material laid on one mile of one lane, pounds. */
export type LbPerLaneMile = In<"lb per lane mile">;
/** A weight in short tons of 2,000 lb. */
export type ShortTon = In<"short ton">;

/** Exact. Source: international yard and pound agreement, 1959. */
const kgPerLb = 0.45359237;
/** Exact. Source: international yard and pound agreement, 1959 (5,280 ft of 0.3048 m). */
const kmPerMile = 1.609344;
/** Exact. Source: international yard and pound agreement, 1959. */
const mmPerInch = 25.4;
/** Exact. Source: the US liquid gallon is 231 cubic inches. */
const litresPerGallon = 3.785411784;
/** Exact. Source: definition of the short ton. */
export const lbPerShortTon = 2000;
/** Exact. Source: definition of the hour. */
export const minutesPerHour = 60;

function finite(value: number, name: string): number {
  if (!Number.isFinite(value)) throw new RangeError(`${name} must be a finite number, not ${value}`);
  return value;
}

/**
 * The weight, marked as pounds.
 *
 * @param value - lb, any finite number
 * @throws RangeError when it is not finite
 * @example lb(12.2)
 */
export function lb(value: number): Lb {
  return finite(value, "a weight in lb") as Lb;
}

/**
 * The discharge, marked as pounds a minute.
 *
 * @param value - lb/min, any finite number
 * @throws RangeError when it is not finite
 * @example lbPerMin(200)
 */
export function lbPerMin(value: number): LbPerMin {
  return finite(value, "a discharge in lb/min") as LbPerMin;
}

/**
 * The speed, marked as miles an hour.
 *
 * @param value - mph, any finite number
 * @throws RangeError when it is not finite
 * @example mph(25)
 */
export function mph(value: number): Mph {
  return finite(value, "a speed in mph") as Mph;
}

/**
 * The application rate, marked as pounds per lane mile.
 *
 * @param value - lb per lane mile, any finite number
 * @throws RangeError when it is not finite
 * @example lbPerLaneMile(300)
 */
export function lbPerLaneMile(value: number): LbPerLaneMile {
  return finite(value, "a rate in lb per lane mile") as LbPerLaneMile;
}

/**
 * The weight, marked as short tons.
 *
 * @param value - short tons, any finite number
 * @throws RangeError when it is not finite
 * @example shortTons(1.5)
 */
export function shortTons(value: number): ShortTon {
  return finite(value, "a weight in short tons") as ShortTon;
}

/** Pounds in so many short tons. @example shortTonsToLb(1.5) // 3000 */
export function shortTonsToLb(tons: number): Lb {
  return lb(tons * lbPerShortTon);
}

/** Short tons in so many pounds. @example lbToShortTons(3000) // 1.5 */
export function lbToShortTons(weightLb: number): ShortTon {
  return shortTons(weightLb / lbPerShortTon);
}

/** Kilograms in so many pounds. @example lbToKg(1) // 0.45359237 */
export function lbToKg(weightLb: number): number {
  return weightLb * kgPerLb;
}

/** Pounds in so many kilograms. @example kgToLb(0.45359237) // 1 */
export function kgToLb(weightKg: number): Lb {
  return lb(weightKg / kgPerLb);
}

/** Kilometres in so many miles. @example milesToKm(1) // 1.609344 */
export function milesToKm(distanceMiles: number): number {
  return distanceMiles * kmPerMile;
}

/** Miles in so many kilometres. @example kmToMiles(1.609344) // 1 */
export function kmToMiles(distanceKm: number): number {
  return distanceKm / kmPerMile;
}

/** Millimetres in so many inches. @example inchesToMm(2) // 50.8 */
export function inchesToMm(lengthIn: number): number {
  return lengthIn * mmPerInch;
}

/** Inches in so many millimetres. @example mmToInches(50.8) // 2 */
export function mmToInches(lengthMm: number): number {
  return lengthMm / mmPerInch;
}

/** Litres in so many US gallons. @example gallonsToLitres(1) // 3.785411784 */
export function gallonsToLitres(volumeGal: number): number {
  return volumeGal * litresPerGallon;
}

/** US gallons in so many litres. @example litresToGallons(3.785411784) // 1 */
export function litresToGallons(volumeLitres: number): number {
  return volumeLitres / litresPerGallon;
}

/** Kilograms per lane kilometre at a rate in pounds per lane mile. @example lbPerLaneMileToKgPerLaneKm(300) // 84.55… */
export function lbPerLaneMileToKgPerLaneKm(rateLbPerLaneMile: number): number {
  return (rateLbPerLaneMile * kgPerLb) / kmPerMile;
}

/** Pounds per lane mile at a rate in kilograms per lane kilometre. @example kgPerLaneKmToLbPerLaneMile(84.554769) // 300 */
export function kgPerLaneKmToLbPerLaneMile(rateKgPerLaneKm: number): LbPerLaneMile {
  return lbPerLaneMile((rateKgPerLaneKm * kmPerMile) / kgPerLb);
}
