import type { Core, EventObject } from "cytoscape";
import { useCallback, useEffect, useMemo, useRef } from "react";
import CytoscapeComponent from "react-cytoscapejs";
import type { NetworkGraph } from "../../../../shared/contracts/network.ts";
import { markBlobUrl } from "../../../components/person-mark/mark-svg.ts";
import { Button } from "../../../components/ui/button.tsx";
import { useTheme } from "../../../lib/theme.ts";
import { pictureElements, pictureStyle } from "../picture-elements.ts";
import type { PictureNode } from "../picture-nodes.ts";
import { useAwake } from "../use-awake.ts";

export type NetworkCanvasProps = {
  nodes: readonly PictureNode[];
  pairs: NetworkGraph["pairs"];
  /** The picture in words. */
  description: string;
  selected: string | null;
  onSelect: (id: string | null) => void;
  /** Changes when another set of people is asked for: the picture is then fitted anew. */
  fitKey: string;
};

/** Positions come from the server; the library only puts things there. */
const layout = { name: "preset", fit: true, padding: 20 };
const zoomStep = 1.4;

/**
 * The picture of the network on a canvas. In a file of its own, because the drawing library is
 * larger than the rest of the room and is fetched after it.
 */
export function NetworkCanvas({
  nodes,
  pairs,
  description,
  selected,
  onSelect,
  fitKey,
}: NetworkCanvasProps) {
  const theme = useTheme();
  const drawing = useRef<Core | null>(null);
  const elements = useMemo(
    () => pictureElements(nodes, pairs, { theme, markUrl: (mark) => markBlobUrl(mark, theme) }),
    [nodes, pairs, theme],
  );
  const stylesheet = useMemo(() => pictureStyle(theme), [theme]);

  // Runs after each update of the component, so what it sets must be taken off first.
  const attach = useCallback(
    (cy: Core) => {
      drawing.current = cy;
      cy.off("tap");
      cy.on("tap", (event: EventObject) => {
        const onNode = event.target !== cy && event.target.isNode();
        onSelect(onNode ? String(event.target.id()) : null);
      });
    },
    [onSelect],
  );

  useEffect(() => {
    const cy = drawing.current;
    if (!cy || cy.destroyed()) return;
    cy.elements(":selected").unselect();
    if (selected !== null) cy.getElementById(selected).select();
  }, [selected]);

  const fitted = useRef(fitKey);
  useEffect(() => {
    if (fitted.current === fitKey) return;
    fitted.current = fitKey;
    drawing.current?.fit(undefined, layout.padding);
  }, [fitKey]);

  const [awake, frame] = useAwake();

  const zoomBy = (factor: number) => {
    const cy = drawing.current;
    if (!cy) return;
    const renderedPosition = { x: cy.width() / 2, y: cy.height() / 2 };
    cy.zoom({ level: cy.zoom() * factor, renderedPosition });
  };

  return (
    <div className="relative border-y border-rule">
      <div role="img" aria-label={description} ref={frame}>
        <CytoscapeComponent
          // Under a finger the sleeping picture lets everything through, or the page could not be
          // scrolled over it: the library keeps every touch it gets.
          className={`relative h-[min(60vh,24rem)] sm:h-[min(70vh,36rem)] w-full ${awake ? "" : "pointer-coarse:pointer-events-none"}`}
          elements={elements}
          layout={layout}
          stylesheet={stylesheet}
          cy={attach}
          minZoom={0.002}
          maxZoom={6}
          userZoomingEnabled={awake}
          userPanningEnabled={awake}
          autoungrabify
          boxSelectionEnabled={false}
        />
      </div>
      <fieldset className="absolute end-2 top-2 flex gap-1 bg-paper p-1" data-print="hide">
        <legend className="sr-only">Size of the picture</legend>
        <Button size="small" aria-label="Nearer" onClick={() => zoomBy(zoomStep)}>
          +
        </Button>
        <Button size="small" aria-label="Further away" onClick={() => zoomBy(1 / zoomStep)}>
          −
        </Button>
        <Button size="small" onClick={() => drawing.current?.fit(undefined, layout.padding)}>
          Whole
        </Button>
      </fieldset>
    </div>
  );
}
