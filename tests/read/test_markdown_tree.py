"""Trees and places, exactly: each line is kind, `line:column`, and the source of a node."""

from __future__ import annotations

import pytest

from read.markdown_trees import outline

CASES = {
    "lists_in_lists_keep_their_places": (
        "- a\n  - {b}\n\n    c\n- d\n  1) e",
        [
            "ListBlock(None) 1:1 '- a\\n  - {b}\\n\\n    c\\n- d\\n  1) e'",
            "  Paragraph 1:3 'a'",
            "    Text 1:3 'a'",
            "  ListBlock(None) 2:3 '- {b}\\n\\n    c'",
            "    Paragraph 2:5 '{b}'",
            "      Marked 2:5 '{b}'",
            "    Paragraph 4:5 'c'",
            "      Text 4:5 'c'",
            "  Paragraph 5:3 'd'",
            "    Text 5:3 'd'",
            "  ListBlock(1) 6:3 '1) e'",
            "    Paragraph 6:6 'e'",
            "      Text 6:6 'e'",
        ],
    ),
    "lazy_lines_belong_to_the_quote_they_continue": (
        "> {a}\n> > b {c}\nlazy {d}\n\n>e",
        [
            "Quote 1:1 '> {a}\\n> > b {c}\\nlazy {d}'",
            "  Paragraph 1:3 '{a}'",
            "    Marked 1:3 '{a}'",
            "  Quote 2:3 '> b {c}\\nlazy {d}'",
            "    Paragraph 2:5 'b {c}\\nlazy {d}'",
            "      Text 2:5 'b '",
            "      Marked 2:7 '{c}'",
            "      Break 2:10 '\\n'",
            "      Text 3:1 'lazy '",
            "      Marked 3:6 '{d}'",
            "Quote 5:1 '>e'",
            "  Paragraph 5:2 'e'",
            "    Text 5:2 'e'",
        ],
    ),
    "cells_of_a_table_are_placed_one_by_one": (
        "| a \\| {b} | c |\n|:-:|--:|\n| `x` {y} | |\n|z",
        [
            "Table 1:1 '| a \\\\| {b} | c |\\n|:-:|--:|\\n| `x` {y} | |\\n|z'",
            "  Cell 1:3 'a \\\\| {b}'",
            "    Text 1:3 'a '",
            "    Text 1:6 '| '",
            "    Marked 1:8 '{b}'",
            "  Cell 1:14 'c'",
            "    Text 1:14 'c'",
            "  Cell 3:3 '`x` {y}'",
            "    CodeText('x') 3:3 '`x`'",
            "    Text 3:6 ' '",
            "    Marked 3:7 '{y}'",
            "  Cell 3:13 ''",
            "  Cell 4:2 'z'",
            "    Text 4:2 'z'",
            "  Cell 4:3 ''",
        ],
    ),
    "carriage_returns_move_nothing": (
        "a {b}\r\nc {d}\r\n\r\n- e\r\n  {f}\r\n",
        [
            "Paragraph 1:1 'a {b}\\nc {d}'",
            "  Text 1:1 'a '",
            "  Marked 1:3 '{b}'",
            "  Break 1:6 '\\n'",
            "  Text 2:1 'c '",
            "  Marked 2:3 '{d}'",
            "ListBlock(None) 4:1 '- e\\n  {f}'",
            "  Paragraph 4:3 'e\\n  {f}'",
            "    Text 4:3 'e'",
            "    Break 4:4 '\\n'",
            "    Marked 5:3 '{f}'",
        ],
    ),
    "tabs_count_as_one_column": (
        "-\t{a}\n\n\t{b}\n>\t{c}",
        [
            "ListBlock(None) 1:1 '-\\t{a}\\n\\n\\t{b}'",
            "  Paragraph 1:3 '{a}'",
            "    Marked 1:3 '{a}'",
            "  Paragraph 3:2 '{b}'",
            "    Marked 3:2 '{b}'",
            "Quote 4:1 '>\\t{c}'",
            "  Paragraph 4:3 '{c}'",
            "    Marked 4:3 '{c}'",
        ],
    ),
    "characters_beyond_the_first_plane_count_as_one": (
        "🧪{a} é *🧪{b}*",
        [
            "Paragraph 1:1 '🧪{a} é *🧪{b}*'",
            "  Text 1:1 '🧪'",
            "  Marked 1:2 '{a}'",
            "  Text 1:5 ' é '",
            "  Emphasis 1:8 '*🧪{b}*'",
            "    Text 1:9 '🧪'",
            "    Marked 1:10 '{b}'",
        ],
    ),
    "a_byte_order_mark_moves_nothing": (
        "\ufeff{a}\n\n# {b} ##\n",
        [
            "Paragraph 1:1 '{a}'",
            "  Marked 1:1 '{a}'",
            "Heading(1) 3:1 '# {b} ##'",
            "  Marked 3:3 '{b}'",
        ],
    ),
    "line_ends_are_breaks_hard_or_not": (
        "a  \nb\\\n  c {d}\ne",
        [
            "Paragraph 1:1 'a  \\nb\\\\\\n  c {d}\\ne'",
            "  Text 1:1 'a'",
            "  HardBreak 1:2 '  \\n'",
            "  Text 2:1 'b'",
            "  HardBreak 2:2 '\\\\\\n'",
            "  Text 3:3 'c '",
            "  Marked 3:5 '{d}'",
            "  Break 3:8 '\\n'",
            "  Text 4:1 'e'",
        ],
    ),
    "underlined_headings_are_headings": (
        "a {b}\nc\n===\n\n> d\n> ---",
        [
            "Heading(1) 1:1 'a {b}\\nc\\n==='",
            "  Text 1:1 'a '",
            "  Marked 1:3 '{b}'",
            "  Break 1:6 '\\n'",
            "  Text 2:1 'c'",
            "Quote 5:1 '> d\\n> ---'",
            "  Heading(2) 5:3 'd\\n> ---'",
            "    Text 5:3 'd'",
        ],
    ),
    "escapes_and_entities_part_the_text": (
        "a \\{b\\} \\* &lt;{c} &#x1F9EA; &nope;",
        [
            "Paragraph 1:1 'a \\\\{b\\\\} \\\\* &lt;{c} &#x1F9EA; &nope;'",
            "  Text 1:1 'a '",
            "  Text 1:4 '{b'",
            "  Text 1:7 '} '",
            "  Text 1:10 '* '",
            "  Text('<') 1:12 '&lt;'",
            "  Marked 1:16 '{c}'",
            "  Text 1:19 ' '",
            "  Text('🧪') 1:20 '&#x1F9EA;'",
            "  Text 1:29 ' &nope;'",
        ],
    ),
    "code_keeps_its_braces": (
        "``` r x\n{a}\n```\n\n`{b}` `` ` ``",
        [
            "CodeBlock('{a}\\n', 'r x') 1:1 '``` r x\\n{a}\\n```'",
            "Paragraph 5:1 '`{b}` `` ` ``'",
            "  CodeText('{b}') 5:1 '`{b}`'",
            "  Text 5:6 ' '",
            "  CodeText('`') 5:7 '`` ` ``'",
        ],
    ),
    "links_and_pictures_are_read_beside_marks": (
        "[*a* {b}](u \"t\"){c} ![x](y) <http://e.x> [r] [w][r]\n\n[r]: /s 'v'",
        [
            "Paragraph 1:1 '[*a* {b}](u \"t\"){c} ![x](y) <http://e.x> [r] [w][r]'",
            "  Link('u', 't') 1:1 '[*a* {b}](u \"t\")'",
            "    Emphasis 1:2 '*a*'",
            "      Text 1:3 'a'",
            "    Text 1:5 ' '",
            "    Marked 1:6 '{b}'",
            "  Marked 1:17 '{c}'",
            "  Text 1:20 ' '",
            "  Image('x', 'y', '') 1:21 '![x](y)'",
            "  Text 1:28 ' '",
            "  Link('http://e.x', '') 1:29 '<http://e.x>'",
            "    Text 1:30 'http://e.x'",
            "  Text 1:41 ' '",
            "  Link('/s', 'v') 1:42 '[r]'",
            "    Text 1:43 'r'",
            "  Text 1:45 ' '",
            "  Link('/s', 'v') 1:46 '[w][r]'",
            "    Text 1:47 'w'",
        ],
    ),
    "brackets_before_a_mark_are_its_words": (
        "[a *b* `c` \\] d]{e} [f] ![g]{h} [r]{i}\n\n[r]: /s",
        [
            "Paragraph 1:1 '[a *b* `c` \\\\] d]{e} [f] ![g]{h} [r]{i}'",
            "  Marked 1:1 '[a *b* `c` \\\\] d]{e}'",
            "    Text 1:2 'a '",
            "    Emphasis 1:4 '*b*'",
            "      Text 1:5 'b'",
            "    Text 1:7 ' '",
            "    CodeText('c') 1:8 '`c`'",
            "    Text 1:11 ' '",
            "    Text 1:13 '] d'",
            "  Text 1:20 ' [f] !'",
            "  Marked 1:26 '[g]{h}'",
            "    Text 1:27 'g'",
            "  Text 1:32 ' '",
            "  Marked 1:33 '[r]{i}'",
            "    Text 1:34 'r'",
        ],
    ),
    "steps_are_counted_through_lists_and_branches": (
        "1. a\n2. b\n\n## H\n\n3. c\n   1. d\n\n:::if dry\n4. e\n:::",
        [
            "Steps 1:1 '1. a\\n2. b'",
            "  Step(1, '1.') 1:1 '1. a'",
            "    Paragraph 1:4 'a'",
            "      Text 1:4 'a'",
            "  Step(2, '2.') 2:1 '2. b'",
            "    Paragraph 2:4 'b'",
            "      Text 2:4 'b'",
            "Heading(2) 4:1 '## H'",
            "  Text 4:4 'H'",
            "Steps 6:1 '3. c\\n   1. d'",
            "  Step(3, '3.') 6:1 '3. c\\n   1. d'",
            "    Paragraph 6:4 'c'",
            "      Text 6:4 'c'",
            "    ListBlock(1) 7:4 '1. d'",
            "      Paragraph 7:7 'd'",
            "        Text 7:7 'd'",
            "Fenced('if', 'dry') 9:1 ':::if dry\\n4. e\\n:::'",
            "  Steps 10:1 '4. e'",
            "    Step(4, '4.') 10:1 '4. e'",
            "      Paragraph 10:4 'e'",
            "        Text 10:4 'e'",
        ],
    ),
    "blocks_stand_in_lists_quotes_and_blocks": (
        "- a\n\n  :::record 3 rows\n  b\n  :::\n\n> :::caution\n> c\n> :::\n:::::question\nd\n:::answer\ne\n:::\n:::",
        [
            "ListBlock(None) 1:1 '- a\\n\\n  :::record 3 rows\\n  b\\n  :::'",
            "  Paragraph 1:3 'a'",
            "    Text 1:3 'a'",
            "  Fenced('record', '3 rows') 3:3 ':::record 3 rows\\n  b\\n  :::'",
            "    Paragraph 4:3 'b'",
            "      Text 4:3 'b'",
            "Quote 7:1 '> :::caution\\n> c\\n> :::'",
            "  Fenced('caution', '') 7:3 ':::caution\\n> c\\n> :::'",
            "    Paragraph 8:3 'c'",
            "      Text 8:3 'c'",
            "Fenced('question', '') 10:1 ':::::question\\nd\\n:::answer\\ne\\n:::\\n:::'",
            "  Paragraph 11:1 'd'",
            "    Text 11:1 'd'",
            "  Fenced('answer', '') 12:1 ':::answer\\ne\\n:::'",
            "    Paragraph 13:1 'e'",
            "      Text 13:1 'e'",
        ],
    ),
    "what_stands_in_a_misspelt_block_is_kept": (
        ":::instuctor\n1. a\n:::\n***\n",
        [
            "Steps 2:1 '1. a'",
            "  Step(1, '1.') 2:1 '1. a'",
            "    Paragraph 2:4 'a'",
            "      Text 2:4 'a'",
            "Rule 4:1 '***'",
        ],
    ),
}


@pytest.mark.parametrize(("text", "expected"), CASES.values(), ids=CASES)
def test_tree_of_a_text(text: str, expected: list[str]) -> None:
    assert outline(text) == expected


def test_loose_and_tight_lists_have_the_same_tree() -> None:
    tight, loose = outline("- a\n- b"), outline("- a\n\n- b")

    assert [line.split(" ")[0:3:2] for line in tight] == [line.split(" ")[0:3:2] for line in loose]


def test_numbered_list_of_an_ordinary_page_is_no_list_of_steps() -> None:
    assert outline("3. a", ordinary=True)[0] == "ListBlock(3) 1:1 '3. a'"


def test_numbered_list_in_a_quote_is_no_list_of_steps() -> None:
    assert outline("> 3. a")[1] == "  ListBlock(3) 1:3 '3. a'"
