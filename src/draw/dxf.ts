import { Colors, DxfWriter, LineTypes, LWPolylineFlags, point3d, Units } from '@tarikjabiri/dxf';
import { arcPieces, circleOf } from '../outline/arcLoop.ts';
import { ringArea } from '../outline/area.ts';
import { checkDrawing, type Drawing, VIEW_NOTE } from './drawing.ts';
import { largestRadius } from './elementMeasure.ts';
import { elementText } from './elementText.ts';
import { plainDecimal } from './plainDecimal.ts';
import { plainText } from './plainText.ts';
import { quantityText, weightText } from './quantityText.ts';

/** Decimals of a coordinate in millimetres: a rounding of 5e-11 mm at most. */
const DECIMALS = 10;
const ELEMENT_COLORS = [Colors.Blue, Colors.Red, Colors.Green, Colors.Magenta, Colors.Cyan];

/**
 * The drawing as a DXF text for the shop: millimetres, true size, every ring one closed LWPOLYLINE in the point order of
 * the design, with arcs where its exact curves are known, or a CIRCLE. Layers: `ELEMENT_1`, `ELEMENT_2`, … hold outer rings, `ELEMENT_1_HOLES`, … the holes inside them,
 * `CENTRE` a small cross on the beam axis, `NOTES` the text. The same drawing always gives the same text.
 *
 * @throws RimwrightError `input` where `checkDrawing` does
 */
export function drawDxf(drawing: Drawing): string {
  checkDrawing(drawing);
  const writer = new DxfWriter();
  writer.setUnits(Units.Millimeters);
  writer.document.header.setVariable('$MEASUREMENT', { 70: 1 });
  writer.document.header.setVariable('$LASTSAVEDBY', { 1: 'Rimwright' });
  addElements(writer, drawing);
  addCentre(writer, drawing);
  addNotes(writer, drawing);
  writer.setZeroLayerAsCurrent();
  return plainNumbers(writer.stringify());
}

function addElements(writer: DxfWriter, { elements }: Drawing): void {
  elements.forEach((element, e) => {
    const name = `ELEMENT_${e + 1}`;
    const color = ELEMENT_COLORS[e % ELEMENT_COLORS.length];
    writer.addLayer(name, color, LineTypes.Continuous);
    if (element.rings.some(isHole)) writer.addLayer(`${name}_HOLES`, color, LineTypes.Continuous);
    element.rings.forEach((ring, r) => {
      const layerName = isHole(ring) ? `${name}_HOLES` : name;
      const curve = element.curves?.[r];
      if (curve === undefined) addPoints(writer, ring, layerName);
      else addCurve(writer, curve, layerName);
    });
  });
}

function addPoints(writer: DxfWriter, ring: Float64Array, layerName: string): void {
  const vertices = Array.from({ length: ring.length / 2 }, (_, k) => ({
    point: { x: 1e3 * ring[2 * k], y: 1e3 * ring[2 * k + 1] },
  }));
  writer.addLWPolyline(vertices, { flags: LWPolylineFlags.Closed, layerName });
}

/** Straight edges and arcs as they are; a circle as one. */
function addCurve(writer: DxfWriter, curve: Float64Array, layerName: string): void {
  const circle = circleOf(curve);
  if (circle !== null) {
    const [x, y] = circle.centre;
    writer.addCircle(point3d(1e3 * x, 1e3 * y), 1e3 * circle.radius, { layerName });
    return;
  }
  const vertices = arcPieces(curve).map(({ from: [x, y], bulge }) => ({
    point: { x: 1e3 * x, y: 1e3 * y },
    ...(bulge !== 0 && { bulge }),
  }));
  writer.addLWPolyline(vertices, { flags: LWPolylineFlags.Closed, layerName });
}

function isHole(ring: Float64Array): boolean {
  return ringArea(ring) < 0;
}

function addCentre(writer: DxfWriter, { elements }: Drawing): void {
  const layerName = 'CENTRE';
  const arm = 1e2 * largestRadius(elements);
  writer.addLayer(layerName, Colors.White, LineTypes.Continuous);
  writer.addLine(point3d(-arm, 0), point3d(arm, 0), { layerName });
  writer.addLine(point3d(0, -arm), point3d(0, arm), { layerName });
}

function addNotes(writer: DxfWriter, drawing: Drawing): void {
  const layerName = 'NOTES';
  const radiusMm = 1e3 * largestRadius(drawing.elements);
  const height = radiusMm / 16;
  writer.addLayer(layerName, Colors.White, LineTypes.Continuous);
  const lines = [
    drawing.title,
    `Distance particle to mask: ${quantityText(drawing.distanceM, 'm')}`,
    'Unit: millimetre. Scale 1 : 1.',
    VIEW_NOTE,
    ...drawing.elements.map((element, e) => `ELEMENT_${e + 1}: ${elementText(element, exactWeight)}`),
    ...drawing.facts.map(({ label, text }) => `${label}: ${text}`),
    ...drawing.notes,
    `Design ${drawing.hash}`,
  ];
  lines.map(dxfText).forEach((line, k) => {
    if (line !== '')
      writer.addText(point3d(-radiusMm, -1.2 * radiusMm - 1.6 * k * height), height, line, { layerName });
  });
}

/** A weight as `readDxf` takes it back: in short where nothing is lost. */
function exactWeight(weight: number): string {
  const short = weightText(weight);
  if (Number(short.replace('−', '-')) === weight) return short;
  return weight > 0 ? `+${weight}` : String(weight);
}

/** A text that holds none of DXF's own escapes: `^` opens a control character, `%%` a symbol, `\U+` a code point. */
function dxfText(text: string): string {
  return plainText(text).replaceAll('^', '^ ').replaceAll('%%', '% %').replaceAll('\\', '/').trim();
}

/** Group codes whose value is a floating-point number. */
function isReal(code: number): boolean {
  return (code >= 10 && code <= 59) || (code >= 110 && code <= 149) || (code >= 210 && code <= 239);
}

/** The library prints 1e-7 as JavaScript does; not every reader takes that. Lines alternate between code and value. */
function plainNumbers(dxf: string): string {
  const lines = dxf.split('\n');
  for (let k = 0; k + 1 < lines.length; k += 2) {
    if (isReal(Number(lines[k]))) lines[k + 1] = plainDecimal(Number(lines[k + 1]), DECIMALS);
  }
  return `${lines.join('\n')}\n`;
}
