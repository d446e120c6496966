"""What a schedule means: energy, money, carbon, NOx, efficiency, security.

In the order in which data passes: `flows` puts the exact plant model into a schedule; `energy`
adds up the year and its months; `money` turns two bills into saving and cash flow, `worth` those
into NPV, IRR and paybacks; `carbon`, `nox` with `nox_limits`, `efficiency` and `security` each
make one record of the results; `checks` refuses studies that these rules cannot judge.
"""
