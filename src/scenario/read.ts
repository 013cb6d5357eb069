// The door of this room: everybody else reads scenarios through here.
export { readScenarioObject, scenarioText } from './read-object.js';
export { type ReadScenario, readScenario } from './read-scenario.js';
