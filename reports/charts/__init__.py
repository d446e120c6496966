"""One figure a module, vector, one palette, one writer.

`palette` and `drawing` (millimetres) carry all others; `scales` and `raster` serve axes and maps.
The figures: `ribbon`, `outcome`, `bill_bars`, `price_curve`, `year_map`, `duration`, `months`,
`energy_flow`, `week`, `cash`, `carbon_years`, `nox_band`, `composite`.
"""
