// @vitest-environment jsdom
import { cleanup, fireEvent, render, screen } from "@testing-library/react";
import { afterEach, describe, expect, it } from "vitest";
import { useAwake } from "../../src/features/compare/use-awake.ts";

afterEach(cleanup);

function Picture() {
  const [awake, frame] = useAwake();
  return (
    <>
      <div ref={frame} data-testid="picture">
        {awake ? "awake" : "asleep"}
      </div>
      <p>elsewhere</p>
    </>
  );
}

function show() {
  render(<Picture />);
  return screen.getByTestId("picture");
}

describe("a picture that can be moved", () => {
  it("wakes under a mouse button and sleeps when the mouse leaves", () => {
    const picture = show();
    expect(picture.textContent).toBe("asleep");
    fireEvent.pointerDown(picture, { pointerType: "mouse" });
    expect(picture.textContent).toBe("awake");
    fireEvent.pointerLeave(picture, { pointerType: "mouse" });
    expect(picture.textContent).toBe("asleep");
  });

  it("lets a finger scroll past, wakes by a tap, and sleeps after a press elsewhere", () => {
    const picture = show();
    fireEvent.pointerDown(picture, { pointerType: "touch" });
    expect(picture.textContent).toBe("asleep");
    fireEvent.click(picture);
    fireEvent.pointerLeave(picture, { pointerType: "touch" });
    expect(picture.textContent).toBe("awake");
    fireEvent.pointerDown(screen.getByText("elsewhere"), { pointerType: "touch" });
    expect(picture.textContent).toBe("asleep");
  });
});
