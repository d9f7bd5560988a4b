// Owns the choice of the reducer for the tool in hand.
// Must not know the DOM, stores, or what any tool does.
import type { Tool } from '../../../app/view-store.ts';
import type { XY } from '../../../model/job.ts';
import { reduceDraw, startDrawing, type DrawState } from './draw-tool.ts';
import { reducePlace, startPlacing, type PlaceState } from './place-tool.ts';
import { reduceSelect, SELECT_AT_REST, type SelectState } from './select-tool.ts';
import type { ToolContext, ToolInput, ToolStep } from './tool.ts';

export type ToolState = SelectState | DrawState | PlaceState;

/** A tool just taken in hand, its cursor at `at`. */
export function takeTool(tool: Tool, at: XY): ToolState {
  switch (tool.kind) {
    case 'select':
      return SELECT_AT_REST;
    case 'draw':
      return startDrawing(tool.part, at);
    case 'place':
      return startPlacing(tool.thing, at);
  }
}

export function reduceTool(state: ToolState, input: ToolInput, context: ToolContext): ToolStep<ToolState> {
  switch (state.kind) {
    case 'select':
      return reduceSelect(state, input, context);
    case 'draw':
      return reduceDraw(state, input, context);
    case 'place':
      return reducePlace(state, input, context);
  }
}
