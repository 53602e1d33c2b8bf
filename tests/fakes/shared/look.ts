/** The plain look of the stand-ins: system fonts, nothing of the product's, so that nobody takes one for the other. */
export const escape = (text: string): string => text.replace(/[&<>"']/g, (c) => `&#${c.charCodeAt(0)};`);

const STYLE = `
:root{color-scheme:light dark;--line:light-dark(#b9b9b9,#555);--soft:light-dark(#f3f3f3,#2a2a2a);--link:light-dark(#0b4f9e,#8ec2ff)}
*{box-sizing:border-box}
body{margin:0;font:16px/1.5 system-ui,sans-serif;background:light-dark(#fff,#1b1b1b);color:light-dark(#1b1b1b,#eee)}
header{background:light-dark(#3b2a60,#2a2145);color:#fff;padding:12px 20px}
header strong{display:block;font-size:18px}
header a{color:#fff}
main{max-width:960px;margin:0 auto;padding:24px 20px 48px}
h1{font-size:24px;margin:0 0 16px}h2{font-size:18px;margin:28px 0 8px}
a{color:var(--link)}
a:focus-visible,button:focus-visible,input:focus-visible,summary:focus-visible,iframe:focus-visible{outline:3px solid var(--link);outline-offset:2px}
.scroll{overflow-x:auto}
table{border-collapse:collapse;width:100%}
th,td{text-align:left;padding:8px 12px 8px 0;border-bottom:1px solid var(--line);vertical-align:top}
td.n,th.n{text-align:right;font-variant-numeric:tabular-nums}
form.card{border:1px solid var(--line);padding:20px;max-width:460px}
label{display:block;font-weight:600;margin:14px 0 4px}
input{font:inherit;width:100%;padding:10px;border:1px solid light-dark(#767676,#999);background:inherit;color:inherit;min-height:44px}
input[aria-invalid=true]{border:2px solid light-dark(#b00020,#ff8a9a)}
button,.button{font:inherit;font-weight:600;padding:10px 18px;min-height:44px;border:1px solid transparent;background:light-dark(#3b2a60,#b9a4ee);color:light-dark(#fff,#1b1b1b);cursor:pointer;display:inline-block;text-decoration:none}
button.second{background:none;color:inherit;border-color:light-dark(#767676,#999)}
.error{color:light-dark(#b00020,#ff8a9a);font-weight:600;margin:4px 0 0}
.note{background:var(--soft);padding:10px 14px;margin:0 0 20px}
dl{display:grid;grid-template-columns:max-content 1fr;gap:4px 16px;margin:0 0 16px}dt{font-weight:600}dd{margin:0;overflow-wrap:anywhere}
pre{white-space:pre-wrap;overflow-wrap:anywhere;background:var(--soft);padding:14px;margin:0;font:14px/1.5 ui-monospace,monospace}
iframe{width:100%;height:560px;border:1px solid var(--line);background:#fff}
.big{font-size:32px;font-variant-numeric:tabular-nums;margin:0 0 4px}
`;

export function layout(options: { title: string; name: string; what: string; main: string }): string {
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1">
<title>${escape(options.title)}</title><style>${STYLE}</style></head>
<body><header><strong>${escape(options.name)}</strong>${escape(options.what)}</header><main>${options.main}</main></body></html>`;
}
