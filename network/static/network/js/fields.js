// Beside the fields: the sign that keypads lack, the other clock, and "now".
(() => {
  "use strict";
  const pad = (number) => String(number).padStart(2, "0");

  const typedInstant = (clock) => {
    const [day, time] = clock.querySelectorAll("input");
    const found = /^(\d{1,2}):?\.?(\d{2})(?::(\d{2}))?$/.exec(time.value.trim());
    if (!day.value || !found) return null;
    const utc = Date.parse(`${day.value}T${pad(found[1])}:${found[2]}:00Z`);
    return Number.isNaN(utc) ? null : new Date(utc - clock.dataset.offsetMinutes * 60000);
  };

  const civil = (instant, zone) => {
    const parts = {};
    const format = new Intl.DateTimeFormat("en-GB", {
      timeZone: zone, year: "numeric", month: "2-digit", day: "2-digit",
      hour: "2-digit", minute: "2-digit", hourCycle: "h23",
    });
    for (const part of format.formatToParts(instant)) parts[part.type] = part.value;
    return { day: `${parts.year}-${parts.month}-${parts.day}`, time: `${parts.hour}:${parts.minute}` };
  };

  const showOtherClock = (clock) => {
    const instant = typedInstant(clock);
    const shown = instant && civil(instant, clock.dataset.zone);
    const sameDay = shown && shown.day === clock.querySelector("input").value;
    clock.querySelector(".civil-time").textContent =
      shown ? (sameDay ? shown.time : `${shown.day} ${shown.time}`) : "–";
  };

  const changed = (input) => input.dispatchEvent(new Event("input", { bubbles: true }));

  const setNow = (clock) => {
    const record = new Date(Date.now() + clock.dataset.offsetMinutes * 60000).toISOString();
    const [day, time] = clock.querySelectorAll("input");
    [day.value, time.value] = [record.slice(0, 10), record.slice(11, 16)];
    changed(time);
  };

  const changeSign = (input) => {
    const text = input.value.trim();
    input.value = /^[-−]/.test(text) ? text.slice(1) : `-${text}`;
    input.focus();
    changed(input);
  };

  document.addEventListener("click", (event) => {
    const button = event.target.closest("button");
    if (!button) return;
    if (button.matches(".sign")) changeSign(button.previousElementSibling);
    if (button.matches(".now")) setNow(button.closest(".record-clock"));
  });
  document.addEventListener("input", (event) => {
    const clock = event.target.closest(".record-clock");
    if (clock) showOtherClock(clock);
  });
  document.querySelectorAll(".record-clock .now").forEach((button) => { button.hidden = false; });
})();
