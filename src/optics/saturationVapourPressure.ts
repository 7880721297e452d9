/**
 * Pressure of water vapour in equilibrium with water (with ice below 0 °C), pascals.
 *
 * Over water: IAPWS-IF97 (1997), eq. (30), region 4. Over ice: Wagner, Saul & Pruss (1994), J. Phys. Chem. Ref. Data
 * 23, 515, eq. (2.21). The pair is that of Stone & Zimmerman's air index calculator, whose check values the tests use.
 *
 * @param temperatureK kelvin, 190 to 647
 */
export function saturationVapourPressure(temperatureK: number): number {
  return temperatureK < 273.15 ? overIce(temperatureK) : overWater(temperatureK);
}

function overWater(temperatureK: number): number {
  const w = temperatureK - 0.238555575678 / (temperatureK - 650.175348448);
  const a = w * w + 1167.05214528 * w - 724213.167032;
  const b = -17.0738469401 * w * w + 12020.8247025 * w - 3232555.03223;
  const c = 14.9151086135 * w * w - 4823.26573616 * w + 405113.405421;
  return 1e6 * ((2 * c) / (Math.sqrt(b * b - 4 * a * c) - b)) ** 4;
}

function overIce(temperatureK: number): number {
  const theta = temperatureK / 273.16;
  return 611.657 * Math.exp(-13.928169 * (1 - theta ** -1.5) + 34.7078238 * (1 - theta ** -1.25));
}
