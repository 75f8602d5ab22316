"use strict";
// Folds the parts; opens the one that an address or a link leads to, and all of them for the printer.
(() => {
  const parts = [...document.querySelectorAll("details.part")];
  const opened = () => {
    const target = document.getElementById(decodeURIComponent(location.hash.slice(1)));
    const part = target && target.closest("details.part");
    if (part) {
      part.open = true;
      target.scrollIntoView();
    }
  };
  for (const part of parts) part.open = false;
  let before = [];
  addEventListener("beforeprint", () => {
    before = parts.filter((part) => !part.open);
    for (const part of before) part.open = true;
  });
  addEventListener("afterprint", () => {
    for (const part of before) part.open = false;
  });
  addEventListener("hashchange", opened);
  opened();
})();
