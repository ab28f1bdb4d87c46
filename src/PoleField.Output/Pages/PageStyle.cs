namespace PoleField.Output.Pages;

/// <summary>Look of the page on light and dark screens and on A4 paper.</summary>
internal static class PageStyle
{
    public const string Css = """
        :root{color-scheme:light dark;--ground:#f4f5f7;--sheet:#ffffff;--ink:#1c1e22;--soft:#565c66;--line:#d5d8dd;--accent:#0b3c6f;
          --met:#14612f;--met-ground:#e4f3e8;--missed:#9c1414;--missed-ground:#fbe6e4;--caution:#6b4a00;--caution-ground:#fbf1d9}
        @media screen and (prefers-color-scheme:dark){:root{--ground:#13161a;--sheet:#1c2026;--ink:#e7e9ec;--soft:#a9b0ba;--line:#39404a;
          --accent:#8fb8ea;--met:#8bdba5;--met-ground:#16301f;--missed:#ff9c94;--missed-ground:#3a1917;--caution:#efcd83;--caution-ground:#33290f}}
        *{box-sizing:border-box}
        body{margin:0;background:var(--ground);color:var(--ink);font:16px/1.5 "Segoe UI","DejaVu Sans",Verdana,Helvetica,Arial,sans-serif}
        main,header,footer{max-width:62rem;margin:0 auto;padding:0 1.25rem}
        header{padding-top:2rem}
        h1{font-size:1.75rem;line-height:1.2;margin:0 0 .25rem}
        h2{font-size:1.25rem;margin:0 0 .75rem;color:var(--accent)}
        p{margin:.25rem 0 .75rem;max-width:46rem}
        .soft{color:var(--soft)}
        section{background:var(--sheet);border:1px solid var(--line);border-radius:6px;padding:1.25rem;margin:1.25rem 0}
        nav ul{display:flex;flex-wrap:wrap;gap:.25rem 1.25rem;list-style:none;padding:0;margin:.75rem 0 0}
        a{color:var(--accent)}
        :focus-visible{outline:3px solid var(--accent);outline-offset:2px}
        .verdict{display:inline-block;font-weight:700;padding:.35rem .8rem;border-radius:4px;border:2px solid currentColor;margin:.5rem 0}
        .met{color:var(--met);font-weight:600}.missed{color:var(--missed);font-weight:600}
        .verdict.met{background:var(--met-ground)}.verdict.missed{background:var(--missed-ground)}
        .verdict.open{color:var(--soft)}
        dl.key{display:grid;grid-template-columns:repeat(auto-fit,minmax(11rem,1fr));gap:.75rem;margin:1rem 0 0}
        dl.key div{border:1px solid var(--line);border-left:4px solid var(--accent);border-radius:4px;padding:.5rem .75rem;background:var(--sheet)}
        dl.key dt{color:var(--soft);font-size:.85rem}
        dl.key dd{margin:0;font-size:1.2rem;font-weight:600;font-variant-numeric:tabular-nums}
        dl.key dd small{display:block;font-size:.8rem;font-weight:400;color:var(--soft)}
        .scroll{overflow-x:auto;margin:0 0 1rem}
        table{border-collapse:collapse;width:100%;font-size:.92rem;font-variant-numeric:tabular-nums}
        caption{text-align:left;font-weight:600;padding:.25rem 0}
        th,td{padding:.3rem .6rem;border-bottom:1px solid var(--line);text-align:left;vertical-align:top}
        thead th{border-bottom:2px solid var(--ink);font-size:.85rem}
        tbody th{font-weight:500}
        .number{text-align:right}td.number{white-space:nowrap}
        .lacks{border-left:4px solid var(--caution);padding-left:.75rem}
        figure{margin:1rem 0}
        .paper{background:#fff;border:1px solid var(--line);border-radius:4px;padding:.25rem}
        .paper svg{display:block;width:100%;height:auto}
        figcaption{font-size:.9rem;margin-top:.4rem;max-width:46rem}figcaption b{font-weight:600}
        details{margin:.5rem 0}summary{cursor:pointer;color:var(--accent)}
        .cautions{background:var(--caution-ground);border-color:var(--caution)}
        .cautions h2{color:var(--caution)}
        li{margin:.3rem 0;max-width:52rem}
        @media (max-width:40rem){main,header,footer{padding:0 .6rem}section{padding:.8rem .6rem}h1{font-size:1.4rem}dl.key{grid-template-columns:1fr 1fr;gap:.4rem}.paper{padding:0}}
        code{font:.85em/1.4 "DejaVu Sans Mono",Consolas,Menlo,monospace;overflow-wrap:anywhere}
        footer{color:var(--soft);font-size:.85rem;padding-bottom:2rem}
        @page{size:A4;margin:15mm 14mm}
        @media print{
          body{background:#fff;font-size:10pt}main,header,footer{max-width:none;padding:0}header{padding-top:0}
          nav,details{display:none}table,thead th{font-size:8pt}th,td{padding:.15rem .35rem}section{border:0;padding:0;margin:6mm 0 0}h1{font-size:18pt}h2{font-size:13pt;break-after:avoid}
          dl.key{grid-template-columns:repeat(5,1fr)}dl.key dd{font-size:12pt}figure,table,tr,dl.key div,.verdict,.cautions{break-inside:avoid}figure{max-width:112mm!important}.paper{border:0;padding:0}.scroll{overflow:visible}
          .cautions{border:1px solid var(--caution);padding:3mm}
          .verdict,.cautions{print-color-adjust:exact;-webkit-print-color-adjust:exact}
        }
        """;
}
