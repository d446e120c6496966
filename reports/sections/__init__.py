"""One section a module: facts in, sentences, rows and figures out.

In the order of the report: `answer`, `bills`, `options`, `certainty`, `site`, `plant`, `weeks`,
`money`, `emissions`, `machine`, `findings`, `method`, `sources`. Each has a partial of the same
name under `templates/sections`.
"""
