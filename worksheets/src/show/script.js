(function () {
  var w = window, d = document, inert = 'script.gudgeon-mathml';
  function each(act) {
    d.querySelectorAll(inert).forEach(function (s) {
      var target = s.previousElementSibling;
      if (target && !target.gudgeon) act(target, s.textContent);
    });
  }
  function typeset() {
    each(function (target, mathml) {
      var tex = new DOMParser().parseFromString(mathml, 'text/html').querySelector('annotation');
      try {
        w.katex.render(tex.textContent, target, { displayMode: target.tagName === 'DIV', fleqn: true });
        target.gudgeon = true;
        if (target.firstChild.className === 'katex-display fleqn') target.firstChild.style.margin = '0.3em 0';
      } catch (_) {}
    });
  }
  function fallBack() {
    each(function (target, mathml) {
      if (/^\s*\$/.test(target.textContent)) {
        target.innerHTML = mathml;
        target.gudgeon = true;
        target.firstChild.style.fontFamily = "'Latin Modern Math','STIX Two Math','Cambria Math','DejaVu Math TeX Gyre',math";
      }
    });
  }
  function later() { setTimeout(fallBack, 1500); }
  if (w.katex) { typeset(); return; }
  if (d.readyState === 'complete') later(); else w.addEventListener('load', later);
  var config = d.getElementById('jupyter-config-data'), base;
  try { base = JSON.parse(config.textContent).baseUrl; } catch (_) {}
  if (!base || w.gudgeonKatex) return;
  w.gudgeonKatex = true;
  var at = base.replace(/\/?$/, '/') + 'kernelspecs/gudgeon/katex/katex.min.';
  var style = d.createElement('link'), script = d.createElement('script');
  style.rel = 'stylesheet'; style.href = at + 'css';
  script.src = at + 'js'; script.onload = typeset; script.onerror = fallBack;
  d.head.append(style, script);
})();
