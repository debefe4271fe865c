/** The kinds of work of the demo. Steps and minutes are common practice, no source. */
import type { WorkKindSeed } from './equipment'

export const WORK_KINDS = [
  {
    name: 'Software update',
    steps: [
      { id: 'save-settings', name: 'Save the settings off the controller and read them back', shortest: 3, likely: 5, longest: 10, dark: false, after: [] },
      { id: 'load-stage', name: 'Load the start-up stage', shortest: 1, likely: 1, longest: 3, dark: false, after: ['save-settings'] },
      { id: 'update-state', name: 'Restart into the update state', shortest: 1, likely: 2, longest: 4, dark: true, after: ['load-stage'] },
      { id: 'load-program', name: 'Load the program package', shortest: 20, likely: 22, longest: 25, dark: true, after: ['update-state'] },
      { id: 'restart', name: 'Restart to normal', shortest: 2, likely: 3, longest: 8, dark: true, after: ['load-program'] },
      { id: 'check', name: 'Check version, clock, settings, points and sensors', shortest: 5, likely: 10, longest: 20, dark: false, after: ['restart'] },
    ],
    rollBack: [
      { id: 'old-package', name: 'Load the former program package', shortest: 10, likely: 12, longest: 18, dark: true, after: [] },
      { id: 'old-restart', name: 'Restart to normal with the former program', shortest: 2, likely: 3, longest: 8, dark: true, after: ['old-package'] },
      { id: 'old-settings', name: 'Load the saved settings and compare them', shortest: 2, likely: 4, longest: 8, dark: false, after: ['old-restart'] },
    ],
  },
  {
    name: 'Controller swap',
    steps: [
      { id: 'save-settings', name: 'Save the settings off the controller and read them back', shortest: 3, likely: 5, longest: 10, dark: false, after: [] },
      { id: 'label-wires', name: 'Label and photograph every wire', shortest: 10, likely: 15, longest: 30, dark: false, after: [] },
      { id: 'isolate', name: 'Switch off, lock out and prove dead', shortest: 3, likely: 5, longest: 10, dark: true, after: ['save-settings', 'label-wires'] },
      { id: 'exchange', name: 'Take the old controller out and wire the new one', shortest: 15, likely: 20, longest: 40, dark: true, after: ['isolate'] },
      { id: 'power-up', name: 'Take the locks off and start the new controller', shortest: 2, likely: 4, longest: 10, dark: true, after: ['exchange'] },
      { id: 'load-settings', name: 'Load the saved settings and compare them', shortest: 3, likely: 5, longest: 12, dark: true, after: ['power-up'] },
      { id: 'check', name: 'Check version, clock, settings, points and sensors', shortest: 5, likely: 10, longest: 20, dark: false, after: ['load-settings'] },
    ],
    rollBack: [
      { id: 'isolate-again', name: 'Switch off, lock out and prove dead', shortest: 3, likely: 5, longest: 10, dark: true, after: [] },
      { id: 'old-back', name: 'Wire the old controller back in', shortest: 10, likely: 15, longest: 25, dark: true, after: ['isolate-again'] },
      { id: 'old-start', name: 'Start the old controller', shortest: 2, likely: 4, longest: 8, dark: true, after: ['old-back'] },
    ],
  },
  {
    name: 'Panel work',
    steps: [
      { id: 'isolate', name: 'Switch the controller off and lock it out', shortest: 2, likely: 3, longest: 6, dark: true, after: [] },
      { id: 'work', name: 'Work inside the panel', shortest: 10, likely: 15, longest: 35, dark: true, after: ['isolate'] },
      { id: 'start', name: 'Take the locks off and start the controller', shortest: 2, likely: 3, longest: 8, dark: true, after: ['work'] },
      { id: 'check', name: 'Check the outputs that were touched', shortest: 3, likely: 5, longest: 10, dark: false, after: ['start'] },
    ],
    rollBack: [
      { id: 'restore', name: 'Put the wiring back as it was', shortest: 5, likely: 8, longest: 15, dark: true, after: [] },
      { id: 'start-again', name: 'Take the locks off and start the controller', shortest: 2, likely: 3, longest: 8, dark: true, after: ['restore'] },
    ],
  },
] as const satisfies readonly WorkKindSeed[]
