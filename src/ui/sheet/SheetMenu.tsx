// Owns the menu that opens at the cursor on the sheet: what can be added here, and what can be done with the selection.
// Must not know how things are drawn or how tools work inside.
import { ContextMenu } from 'radix-ui';
import type { ReactElement, ReactNode } from 'react';
import { useJobStore } from '../../app/job-store.ts';
import { useViewStore, type Tool } from '../../app/view-store.ts';
import type { Part, PartKind } from '../../model/job.ts';
import { findMaterial, listMaterialIds } from '../../model/materials/library.ts';
import { PART_KINDS } from '../../model/parts/registry.ts';
import type { SheetController } from './sheet-controller.ts';
import { findPart, nameOf } from './things.ts';
import { addCorner, dropCorner } from './tools/corners.ts';
import { duplicate, removeSelected, reorder } from './tools/select-tool.ts';
import { RECORD, type ToolAction, type ToolContext } from './tools/tool.ts';

interface Props {
  readonly controller: SheetController | null;
  readonly focusSheet: () => void;
  readonly children: ReactNode;
}

export function SheetMenu({ controller, focusSheet, children }: Props): ReactElement {
  return (
    <ContextMenu.Root modal={false}>
      <ContextMenu.Trigger asChild>{children}</ContextMenu.Trigger>
      <ContextMenu.Portal>
        <ContextMenu.Content
          className="sheet-menu"
          collisionPadding={8}
          onCloseAutoFocus={(event) => {
            event.preventDefault();
            focusSheet();
          }}
        >
          {controller === null ? null : (
            <>
              <SelectionItems controller={controller} />
              <AddItems controller={controller} />
              <PaintChoice />
              <ContextMenu.Separator />
              <Item keys="F" onSelect={() => controller.fit()}>
                fit the sheet
              </Item>
            </>
          )}
        </ContextMenu.Content>
      </ContextMenu.Portal>
    </ContextMenu.Root>
  );
}

function Item(props: { keys?: string; disabled?: boolean; onSelect: () => void; children: ReactNode }): ReactElement {
  return (
    <ContextMenu.Item disabled={props.disabled ?? false} onSelect={props.onSelect}>
      {props.children}
      {props.keys === undefined ? null : <kbd>{props.keys}</kbd>}
    </ContextMenu.Item>
  );
}

const KINDS = Object.keys(PART_KINDS) as readonly PartKind[];

function AddItems({ controller }: { controller: SheetController }): ReactElement {
  const add = (tool: Tool) => () => controller.startAtMenu(tool);
  return (
    <ContextMenu.Group aria-label="Add here">
      <ContextMenu.Label>Add here</ContextMenu.Label>
      {KINDS.map((part) => (
        <Item key={part} onSelect={add({ kind: 'draw', part })}>
          {PART_KINDS[part].label}
        </Item>
      ))}
      <Item onSelect={add({ kind: 'place', thing: 'probe' })}>probe</Item>
      <Item onSelect={add({ kind: 'place', thing: 'line current' })}>line current</Item>
    </ContextMenu.Group>
  );
}

function PaintChoice(): ReactElement {
  const job = useJobStore((state) => state.job);
  const paint = useViewStore((state) => state.paint);
  const setPaint = useViewStore((state) => state.setPaint);
  const nameOfMaterial = (id: string): string => findMaterial(job, id)?.name ?? id;
  return (
    <ContextMenu.Sub>
      <ContextMenu.SubTrigger>
        <span>
          new parts are of <strong>{nameOfMaterial(paint)}</strong>
        </span>
        <span aria-hidden="true">›</span>
      </ContextMenu.SubTrigger>
      <ContextMenu.Portal>
        <ContextMenu.SubContent className="sheet-menu sheet-menu-long" collisionPadding={8}>
          <ContextMenu.RadioGroup value={paint} onValueChange={setPaint}>
            {listMaterialIds(job).map((id) => (
              <ContextMenu.RadioItem key={id} value={id}>
                <ContextMenu.ItemIndicator>✓</ContextMenu.ItemIndicator>
                {nameOfMaterial(id)}
              </ContextMenu.RadioItem>
            ))}
          </ContextMenu.RadioGroup>
        </ContextMenu.SubContent>
      </ContextMenu.Portal>
    </ContextMenu.Sub>
  );
}

function SelectionItems({ controller }: { controller: SheetController }): ReactElement | null {
  const job = useJobStore((state) => state.job);
  const selection = useViewStore((state) => state.selection);
  const [first] = selection;
  if (first === undefined) return null;
  const part = selection.length === 1 ? findPart(job, first) : null;
  const rank = job.parts.findIndex((candidate) => candidate.id === first);
  const act = (commands: (context: ToolContext) => readonly ToolAction[]) => () => controller.act(commands);
  return (
    <ContextMenu.Group aria-label="Selection">
      <ContextMenu.Label>{selection.length === 1 ? nameOf(job, first) : `${selection.length} things`}</ContextMenu.Label>
      <Item keys="Ctrl D" onSelect={act(duplicate)}>
        duplicate
      </Item>
      {part === null ? null : (
        <>
          <Item keys="]" disabled={rank === job.parts.length - 1} onSelect={act((context) => reorder(1, context))}>
            bring forward
          </Item>
          <Item keys="[" disabled={rank === 0} onSelect={act((context) => reorder(-1, context))}>
            send backward
          </Item>
          <CornerItems part={part} controller={controller} />
          <Item onSelect={act(() => [leaveOut(rank, !part.leftOutOfReference)])}>
            {part.leftOutOfReference ? 'keep in the reference' : 'leave out of the reference'}
          </Item>
        </>
      )}
      <Item keys="Del" onSelect={act(removeSelected)}>
        delete
      </Item>
      <ContextMenu.Separator />
    </ContextMenu.Group>
  );
}

/** Shown where the menu was opened on a side or a corner. */
function CornerItems({ part, controller }: { part: Part; controller: SheetController }): ReactElement {
  const drop = controller.atMenu((at, context) => dropCorner(part, at, context));
  const add = drop === null ? controller.atMenu((at, context) => addCorner(part, at, context)) : null;
  return (
    <>
      {drop === null ? null : <Item onSelect={() => controller.act(() => [drop])}>take this corner away</Item>}
      {add === null ? null : <Item onSelect={() => controller.act(() => [add])}>add a corner here</Item>}
    </>
  );
}

function leaveOut(rank: number, value: boolean): ToolAction {
  return { do: 'edit', command: { do: 'set', path: ['parts', rank, 'leftOutOfReference'], value }, policy: RECORD };
}
