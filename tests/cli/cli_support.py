"""A small table and documents about it."""

GOOD = """\
g,x,y
a,12.6,24.3
a,10.1,17.7
a,7.8,20.1
a,8.0,15.7
a,10.4,20.4
b,11.1,17.3
b,10.0,19.8
b,7.0,21.6
b,10.6,27.2
b,10.4,19.6
c,12.5,20.6
c,11.8,18.9
c,10.4,23.1
c,11.4,20.4
c,7.8,21.3
"""

COMPARE = """\
read "good.csv" as t
compare x, y across g in t as m
"""

OMNIBUS = COMPARE + "show omnibus of m\n"
