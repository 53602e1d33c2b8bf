import { describe, expect, it } from "vitest";
import { earlyInput } from "./early-input";

const text = (name: string, value: string, defaultValue = "", type = "text") => ({ name, type, value, defaultValue, checked: false, defaultChecked: false });
const box = (name: string, value: string, checked: boolean, type = "checkbox", defaultChecked = false) => ({ name, type, value, defaultValue: value, checked, defaultChecked });

describe("what was typed before the script ran", () => {
  it("keeps text that differs from what the server sent, and nothing else", () => {
    expect(earlyInput([text("wants", "Seats"), text("phone", "555", "555"), text("", "search"), text("photo", "C:\\x.jpg", "", "file"), text("id", "7", "", "hidden")])).toEqual([{ name: "wants", value: "Seats" }]);
  });
  it("keeps boxes with every ticked one of their name, and the chosen radio", () => {
    expect(earlyInput([box("checked", "clean", true), box("checked", "torque", false), box("checked", "photos", true), box("use", "road", false, "radio"), box("use", "other", true, "radio")])).toEqual([
      { name: "checked", value: { ticked: true, all: ["clean", "photos"] } },
      { name: "use", value: "other" },
    ]);
  });
  it("keeps a box that was unticked", () => {
    expect(earlyInput([box("active", "on", false, "checkbox", true)])).toEqual([{ name: "active", value: { ticked: false, all: [] } }]);
  });
  it("keeps a choice that is not the sent one", () => {
    const options = [{ value: "a", defaultSelected: false }, { value: "b", defaultSelected: true }];
    expect(earlyInput([{ name: "side", type: "select-one", value: "a", options }, { name: "other", type: "select-one", value: "b", options }])).toEqual([{ name: "side", value: "a" }]);
  });
});
