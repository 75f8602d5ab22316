"use strict";
// Folds the parts; opens the one that an address or a link leads to, and all of them for the printer. Tables that are wider than the
// page can be reached and moved by the keyboard.
(() => {
  const parts = [...document.querySelectorAll("details.part")];
  const opened = () => {
    const target = document.getElementById(location.hash.slice(1));
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
  const wide = () => {
    for (const box of document.querySelectorAll(".scroll")) {
      if (box.scrollWidth > box.clientWidth) box.tabIndex = 0;
      else box.removeAttribute("tabindex");
    }
  };
  addEventListener("hashchange", opened);
  addEventListener("resize", wide);
  document.addEventListener("toggle", wide, true);
  opened();
  wide();
})();
