/**
 * Every code of a message, with its meaning in a line. A code, once published, keeps its meaning: scripts may
 * look for it.
 */
export const codes: Readonly<Record<string, string>> = {
  // The text of the file
  'empty-file': 'there is nothing in the file',
  'file-too-large': 'the file is larger than any flowsheet',
  'two-documents': 'one file holds one flowsheet',
  yaml: 'the text is no YAML',
  'yaml-alias': 'an alias without its anchor, or too many of them',
  'yaml-key': 'a key that is no plain word',
  'yaml-tag': 'a YAML tag, which a flowsheet does not need',
  'duplicate-key': 'one key stands twice in a mapping',

  // Keys and values
  'empty-value': 'a key without its value',
  'missing-key': 'a key without default is left out',
  'unknown-key': 'a key that nothing knows',
  'unused-key': 'a key that has no effect where it stands',
  'wrong-type': 'a list or mapping where one value is needed, or the other way round',
  'wrong-value': 'a value that is none of those that fit',
  'wrong-version': 'the file is written for another version of the format',
  'not-available': 'part of the format that is not built yet',
  'too-many': 'more errors than are shown',

  // Quantities
  'missing-unit': 'a bare number where a unit is needed',
  'no-quantity': 'text where a number with its unit is needed',
  'out-of-range': 'a value outside its bounds',
  'unknown-unit': 'a unit that nothing knows',
  'wrong-unit': 'a unit of another dimension',

  // Names
  'bad-name': 'a name with characters that names do not have',
  'duplicate-name': 'one name for two things',
  'reserved-name': 'a name with a meaning of its own',
  'unknown-component': 'a component that is not declared or not built in',
  'unknown-constant': 'a published constant of that name is not known',
  'unknown-kind': 'a block kind that is not known',
  'unknown-name': 'a feed or block that is not in the file',
  'unknown-port': 'a port that the block does not have',
  'unknown-reaction': 'a reaction that is not in the file',
  'unknown-stream': 'a stream that is not in the file',

  // Components, reactions, feeds
  'bad-formula': 'a chemical formula or a formula for numbers cannot be read',
  'constant-mismatch': 'a published constant belongs to another reaction',
  'dependent-reaction': 'a reaction follows from others beside it',
  'idle-component': 'a component stands on both sides of a reaction and cancels',
  'reaction-syntax': 'the text of a reaction cannot be read',
  'unbalanced-reaction': 'atoms of the two sides differ',
  'bad-feed': 'the feed of a command cannot be read',
  'empty-feed': 'a feed of nothing',
  'mixed-parts': 'a composition mixes bare parts with per cent',

  // Blocks and streams
  'idle-setting': 'a setting without effect beside the others',
  'missing-setting': 'a block lacks the setting that fixes what it does',
  'split-above-one': 'a block gives out more than it takes in',
  'too-many-settings': 'settings that exclude each other',
  'bad-stream': 'the text of a stream cannot be read or leads nowhere',
  'dangling-outlet': 'an outlet without a stream',
  'missing-port': 'it is not said which port a stream takes',
  'port-taken': 'two streams on one port',
  'stream-to-itself': 'a stream from a block to the same block',
  'unfed-block': 'an inlet without a stream',
  'unreached-block': 'a block that no feed reaches',
  'unused-feed': 'a feed without a stream',
  'no-way-out': 'a component can enter a loop and not leave it',

  // Ledger, aims, cases, figures, solver, changes
  'bad-aim': 'an aim that cannot be pursued',
  'bad-ledger': 'an entry of the ledger that does not fit',
  'bad-set': 'a change that is not written PATH=VALUE',
  'bad-tear': 'a stream that cannot be torn',
  'unknown-case': 'a case that is not in the file',
  'unknown-figure': 'a name of a formula that leads to no number',
  'unknown-setting': 'a path that leads to no setting',

  // While the loop is closed
  'adiabatic-outlet': 'no outlet temperature fits the heat balance of a reactor',
  'balance-open': 'the tears stand still and a balance over the battery limit does not close',
  equilibrium: 'reaction equilibrium was not found',
  'not-closed': 'the loop did not close',
  'phase-split': 'gas and liquid could not be told apart',
  'pressure-drop': 'a pressure drop leaves no pressure',
  'pressure-fall': 'a pump or compressor set below its suction',
  'pressure-rise': 'a valve or mixer set above its inlet',
  'reactant-used-up': 'a conversion asks for more of a reactant than there is',
  'temperature-bound': 'a temperature beyond the range of the data',
  'vapour-fraction': 'a vapour fraction that cannot be reached',

  // Warnings of a result
  'above-critical': 'a vapour pressure above the critical temperature',
  'below-freezing': 'a liquid below its freezing point',
  carbon: 'the gas may form carbon',
  'condenser-heats': 'a condenser that heats',
  'constant-out-of-range': 'a published constant used outside its range',
  'gas-at-suction': 'gas enters a pump',
  'gas-would-condense': 'a component treated as a gas would condense',
  'hot-discharge': 'a compressor stage discharges hotter than usual',
  'liquid-at-suction': 'liquid enters a compressor',
  'mixing-pressure': 'a mixer lets an inlet down without work',
  'much-dissolved': 'more gas dissolves than the method is meant for',
  'no-vapour-pressure': 'a component to be condensed has no vapour pressure data',
  'no-condensate': 'a condenser condenses nothing',

  fault: 'a fault of Looptally itself',
};
