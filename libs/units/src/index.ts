export { fromDisplay, toDisplay, type DisplayUnits } from './display-conversion';
export { roundCumulatively, roundedSum } from './ledger-rounding';
export { formatForEditing, formatQuantity, type FormatOptions } from './quantity-format';
export { displayUnit, unitsAccepted, type QuantityKind, type UnitSystem } from './quantity-kinds';
export { parseQuantity, type ParsedQuantity, type RefusedQuantity } from './quantity-parse';
