export { countSlips, nearest } from '../units/nearest.ts'; // stands in units because unit names need it too
