namespace CloudStruct.Products.Report;

internal sealed partial class ReportPage
{
    private const string Style = """
        :root { --ink: #1a1a1a; --quiet: #525252; --rule: #c9c4ba; --paper: #fffefb; --tint: #f3efe6; --blue: #00548a; --warn: #8a3b00; color-scheme: light; }
        * { box-sizing: border-box; }
        body { margin: 0 auto; max-width: 70rem; padding: 1.5rem 1.25rem 4rem; background: var(--paper); color: var(--ink); font: 1rem/1.55 "Charter", "Bitstream Charter", "Sitka Text", "Cambria", Georgia, serif; }
        h1 { font-size: 2.1rem; line-height: 1.15; margin: .1rem 0 .5rem; overflow-wrap: anywhere; }
        h2 { font-size: 1.3rem; margin: 2.6rem 0 .6rem; padding-top: .5rem; border-top: 2px solid var(--ink); }
        h3 { font-size: 1.05rem; margin: 1.4rem 0 .4rem; }
        a { color: var(--blue); text-underline-offset: .15em; }
        a:focus-visible, summary:focus-visible, .scroll:focus-visible { outline: 3px solid #d55e00; outline-offset: 2px; }
        .skip { position: absolute; left: -99rem; } .skip:focus { position: static; }
        .kicker, nav, dt, .limits, .note, figcaption, table, .strip text { font-family: system-ui, "Segoe UI", "Helvetica Neue", Arial, sans-serif; }
        .kicker { margin: 0; color: var(--quiet); font-size: .85rem; }
        .lead { margin: 0; max-width: 46rem; }
        .numbers dl { display: grid; grid-template-columns: repeat(auto-fit, minmax(10.5rem, 1fr)); gap: 0; margin: 1.2rem 0 0; border-top: 2px solid var(--ink); border-bottom: 1px solid var(--rule); }
        .numbers div { padding: .7rem .9rem .8rem 0; }
        .numbers dt { font-size: .8rem; color: var(--quiet); }
        .numbers dd { margin: 0; }
        .value { font-size: 1.25rem; line-height: 1.25; font-weight: 600; }
        .limits { font-size: .85rem; font-weight: 600; } .note { font-size: .8rem; color: var(--quiet); line-height: 1.4; }
        .doubts { margin: 1rem 0 0; padding: .2rem 1rem .6rem; background: var(--tint); border-left: 5px solid var(--warn); }
        .doubts h2 { border: 0; margin: .4rem 0 .2rem; padding: 0; font-size: 1.05rem; color: var(--warn); }
        .doubts ul { margin: .2rem 0; padding-left: 1.2rem; } .doubts p { margin: .2rem 0; }
        nav ul { list-style: none; display: flex; flex-wrap: wrap; gap: .3rem 1.2rem; padding: 0; margin: 1rem 0 0; font-size: .9rem; }
        .strip { margin: 1.6rem 0 0; } .strip h2 { margin-bottom: .2rem; }
        .strip svg { display: block; width: 100%; min-width: 44rem; height: auto; }
        .strip p { margin: .3rem 0 0; max-width: 46rem; }
        .scroll { overflow-x: auto; margin: 1rem 0; }
        .columns { display: grid; grid-template-columns: repeat(auto-fit, minmax(17rem, 1fr)); gap: 1rem 2rem; align-items: start; }
        figure { margin: 1rem 0; } figure.column img { width: 100%; max-width: 26rem; height: auto; } figure.wide img { width: 100%; height: auto; }
        figcaption { font-size: .8rem; color: var(--quiet); }
        table { border-collapse: collapse; font-size: .82rem; font-variant-numeric: tabular-nums; }
        caption { text-align: left; padding: 0 0 .35rem; color: var(--quiet); font-size: .9rem; }
        th, td { padding: .22rem .7rem .22rem 0; text-align: right; vertical-align: bottom; border-bottom: 1px solid var(--rule); font-weight: 400; }
        thead th { border-bottom: 1px solid var(--ink); font-weight: 600; line-height: 1.2; }
        tbody th, .word { text-align: left !important; } thead th:first-child { text-align: left; }
        tr:target { background: #ffe9c7; }
        td { white-space: nowrap; } td code { white-space: normal; overflow-wrap: anywhere; }
        pre { white-space: pre-wrap; overflow-wrap: anywhere; background: var(--tint); padding: .8rem 1rem; font-size: .8rem; }
        .facts { display: grid; grid-template-columns: max-content 1fr; gap: .15rem 1.2rem; } .facts dd { margin: 0; overflow-wrap: anywhere; }
        .linked-only { display: none; }
        @media print {
          @page { margin: 16mm; }
          body { max-width: none; padding: 0; background: #fff; font-size: 10pt; } nav, .skip { display: none; }
          .numbers dl { grid-template-columns: repeat(5, 1fr); } .value { font-size: 1rem; } .limits, .note { font-size: .7rem; } table { font-size: .68rem; } th, td { padding-right: .45rem; }
          figure, tr, .numbers, .doubts, .strip { break-inside: avoid; } h2 { break-after: avoid; }
          .scroll { overflow: visible; } .strip svg { min-width: 0; } a { color: inherit; }
        }
        """;
}
