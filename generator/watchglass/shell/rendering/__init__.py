"""Findings as text: five dresses of one thing, each a pure function of the findings and a style.

`full` is for a person at a terminal, `line` for editors and for searching, `json_` for other
programs, `sarif` and `github` for those that show findings of many tools. `tally` sorts and counts
for all, `cells` knows how wide a character is and how an unsafe one is shown. Nothing here looks at
the terminal or writes to it: a `Style` is handed in.
The modules are imported where they are needed, since start-up is felt.
"""
