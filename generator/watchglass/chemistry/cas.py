# placeholder: to be overwritten
def check_digit_holds(text: str) -> bool:
    import re
    m = re.fullmatch(r"(\d{2,7})-(\d\d)-(\d)", text)
    if not m: return False
    d = m[1] + m[2]
    return sum(i * int(c) for i, c in enumerate(reversed(d), 1)) % 10 == int(m[3])
