// Colours for Tussock in JupyterLab: cells, `.tus` files, fences in rendered Markdown.
//
// Written by hand in the form that JupyterLab loads, so that there is nothing to build.
(() => {
  "use strict";

  const words = (list) => new Set(list.split(" "));
  const VERBS = words("policy read admit derive levels label compare show write pin");
  const WORDS = words("alpha interval pairs scores effect missing sample as separator decimal encoding where because merging into unit better across in of for coefficients at within");
  const OPERATORS = words("and or not if then else");

  // The state is what an open text ends with, across lines for a long one.
  const parser = {
    name: "tussock",
    startState: () => ({ closing: null }),
    token(stream, state) {
      if (state.closing !== null) return text(stream, state);
      if (stream.eatSpace()) return null;
      const margin = stream.pos === 0;
      if (stream.match(/^#.*/)) return "comment";
      if (stream.match('"""')) return text(stream, state, '"""');
      if (stream.match('"')) return text(stream, state, '"');
      if (stream.match(/^`[^`]*`?/)) return "variableName";
      if (stream.match(/^(\d+(\.\d*)?|\.\d+)([eE][-+]?\d+)?%?/)) return "number";
      const word = stream.match(/^[\p{L}_][\p{L}\p{N}_]*/u);
      if (word) {
        if (margin && VERBS.has(word[0])) return "keyword";
        if (OPERATORS.has(word[0])) return "operatorKeyword";
        return WORDS.has(word[0]) ? "modifier" : null;
      }
      return stream.match(/^(!=|<=|>=|[=<>+\-*\/^])/) ? "operator" : (stream.next(), null);
    },
    languageData: { commentTokens: { line: "#" } },
  };

  function text(stream, state, opened) {
    state.closing = opened ?? state.closing;
    if (!opened && stream.match(/^\{\{.*?(\}\}|$)/)) return "string.special";
    while (!stream.eol()) {
      if (stream.match(state.closing)) {
        state.closing = null;
        return "string";
      }
      if (stream.match("{{", false)) return "string";
      stream.next();
    }
    // Only a long text goes on in the next line.
    if (state.closing === '"') state.closing = null;
    return "string";
  }

  async function shared(scope, name) {
    const versions = Object.values(scope[name] ?? {});
    if (versions.length === 0) throw new Error(`tussock-lab: JupyterLab shares no ${name}`);
    return (await versions[0].get())();
  }

  async function plugin(scope) {
    const { IEditorLanguageRegistry } = await shared(scope, "@jupyterlab/codemirror");
    const { LanguageSupport, StreamLanguage } = await shared(scope, "@codemirror/language");
    return {
      id: "tussock-lab:language",
      autoStart: true,
      requires: [IEditorLanguageRegistry],
      activate(app, languages) {
        languages.addLanguage({
          name: "tussock",
          displayName: "Tussock",
          mime: "text/x-tussock",
          extensions: ["tus"],
          support: new LanguageSupport(StreamLanguage.define(parser)),
        });
        app.docRegistry.addFileType({
          name: "tussock",
          displayName: "Tussock script",
          extensions: [".tus"],
          mimeTypes: ["text/x-tussock"],
        });
      },
    };
  }

  let scope;
  const container = {
    init(given) {
      scope = given;
    },
    async get() {
      const found = await plugin(scope);
      return () => ({ __esModule: true, default: found });
    },
  };
  window._JUPYTERLAB = window._JUPYTERLAB ?? {};
  window._JUPYTERLAB["tussock-lab"] = container;
})();
