import base64
import datetime as dt
import hashlib
import json
import tracemalloc

import brotli
import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.document import CHECK_CODE_ALPHABET, DocumentError, canonical_bytes, check_code, input_digest
from webapp.links import (
    CHECK_BYTES,
    MAX_DOCUMENT_BYTES,
    MAX_LINK_CHARACTERS,
    LinkError,
    decode_document,
    encode_document,
)

PLAN: dict[str, object] = {
    "format": 1,
    "title": "Tannery Row, spring plan — “drill” № 3 & <b>",
    "datum": "NAVD88",
    "water": {"flood_side": {"value": "104.60 ft", "low": "104.1 ft", "date": dt.date(2031, 3, 2)}},
    "panel": [
        {"id": "P1", "points": [["0 ft", "0 ft"], ["3 ft", "0 ft"]], "braced": False, "rows": 4, "ratio": 0.1}
    ],
}

names = st.text(max_size=12)
plain = st.recursive(
    st.text(max_size=30)
    | st.integers(-(10**18), 10**18)
    | st.booleans()
    | st.floats(allow_nan=False, allow_infinity=False),
    lambda inner: st.lists(inner, max_size=4) | st.dictionaries(names, inner, max_size=4),
    max_leaves=25,
)
documents = st.dictionaries(names, plain, max_size=6)


def packed(content: bytes, version: str = "1") -> str:
    """A link with sound check bytes around any content, as a malicious maker would build it."""
    body = hashlib.sha256(content).digest()[:CHECK_BYTES] + content
    return f"{version}." + base64.urlsafe_b64encode(body).rstrip(b"=").decode()


def link_to_json(text: str) -> str:
    return packed(brotli.compress(text.encode()))


@given(documents)
def test_a_document_comes_back_as_it_went_in(document: dict[str, object]) -> None:
    text = encode_document(document)
    back = decode_document(text)
    assert back == document
    assert json.dumps(back) == json.dumps(document)  # order and kind of number too


@given(documents)
def test_a_link_needs_no_quoting_in_an_address(document: dict[str, object]) -> None:
    allowed = set("ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_.")
    assert set(encode_document(document)) <= allowed


def test_dates_arrive_as_iso_text_and_the_digest_does_not_notice() -> None:
    back = decode_document(encode_document(PLAN))
    assert back["water"] == {"flood_side": {"value": "104.60 ft", "low": "104.1 ft", "date": "2031-03-02"}}
    assert list(back) == list(PLAN)
    assert input_digest(back) == input_digest(PLAN)


def test_times_keep_their_zone() -> None:
    time = dt.datetime(2031, 4, 2, 6, tzinfo=dt.timezone(dt.timedelta(hours=-5)))
    assert decode_document(encode_document({"as_of": time})) == {"as_of": "2031-04-02T06:00:00-05:00"}


def test_blanks_and_line_breaks_from_mail_are_passed_over() -> None:
    text = encode_document(PLAN)
    wrapped = "\r\n".join(text[start : start + 40] for start in range(0, len(text), 40))
    assert decode_document(f"  {wrapped} ") == decode_document(text)


@given(st.data())
def test_a_changed_link_is_refused_or_says_the_same(data: st.DataObject) -> None:
    text = encode_document(PLAN)
    place = data.draw(st.integers(0, len(text) - 1))
    letter = data.draw(st.characters(codec="utf-8") | st.sampled_from("AZaz09-_.= "))
    kind = data.draw(st.sampled_from(["flip", "cut", "drop", "insert", "swap"]))
    changed = {
        "flip": text[:place] + letter + text[place + 1 :],
        "cut": text[:place],
        "drop": text[:place] + text[place + 1 :],
        "insert": text[:place] + letter + text[place:],
        "swap": text[:place] + text[place:][::-1],
    }[kind]
    try:
        document = decode_document(changed)
    except LinkError:
        return
    assert document == decode_document(text)


@given(st.binary(max_size=200))
def test_any_bytes_with_sound_check_bytes_are_refused_or_a_table(content: bytes) -> None:
    try:
        document = decode_document(packed(content))
    except LinkError:
        return
    assert isinstance(document, dict)


@given(st.text(max_size=60))
def test_any_text_is_refused_plainly(text: str) -> None:
    with pytest.raises(LinkError, match=r"^this link"):
        decode_document(text)


def test_every_single_letter_change_is_noticed() -> None:
    text = encode_document(PLAN)
    for place in range(2, len(text) - 1):  # bits of the very last letter may carry nothing
        other = "A" if text[place] != "A" else "B"
        with pytest.raises(LinkError, match="damaged"):
            decode_document(text[:place] + other + text[place + 1 :])


@pytest.mark.parametrize("version", ["2", "7", "999999"])
def test_newer_links_are_named(version: str) -> None:
    message = rf"made by a newer Sillhead \(link version {version}\); this one reads version 1"
    with pytest.raises(LinkError, match=message):
        decode_document(f"{version}.AAAA")


@pytest.mark.parametrize(
    "text", ["", "1", "1.", "0.AAAA", "-1.AAAA", "1.A", "x1.AAAA", "1.$$$$", "٣.AAAA", "1234567.AAAA"]
)
def test_what_is_no_link_is_damaged(text: str) -> None:
    with pytest.raises(LinkError, match="damaged"):
        decode_document(text)


@pytest.mark.parametrize(
    "content",
    [
        '{"a":NaN}', '{"a":Infinity}', '{"a":-Infinity}', '{"a":1e999}', "[1]", '"text"', "1", "null",
        "{", "", '{"a":null}', '{"a":1,"a":2}', '{"a":"\\ud800"}', '{"a":' + "9" * 5000 + "}",
    ],
)  # fmt: skip
def test_what_is_no_document_is_damaged(content: str) -> None:
    with pytest.raises(LinkError, match="damaged"):
        decode_document(link_to_json(content))


@pytest.mark.parametrize("depth", [40, 5_000, 400_000])
@pytest.mark.parametrize("pair", ["[]", '{"a": }'])
def test_endless_nests_are_refused(depth: int, pair: str) -> None:
    opening, closing = pair[:-1].strip(), pair[-1]
    depth = min(depth, 900_000 // len(pair))
    with pytest.raises(LinkError, match="damaged"):
        decode_document(link_to_json('{"a":' + opening * depth + "1" + closing * depth + "}"))


def test_a_deep_document_makes_no_link() -> None:
    nest: dict[str, object] = {}
    for _ in range(40):
        nest = {"a": nest}
    with pytest.raises(LinkError, match="nested more than 32 deep"):
        encode_document(nest)


@pytest.mark.parametrize(
    "value",
    [
        None,
        float("nan"),
        float("inf"),
        b"x",
        (1,),
        {1: 2},
        "\ud800",
        dt.time(6, 30),
    ],
)
def test_values_that_no_file_holds_make_no_link(value: object) -> None:
    with pytest.raises(LinkError, match="no link can be made"):
        encode_document({"a": value})


def test_a_bomb_is_stopped_at_the_bound() -> None:
    bomb = packed(brotli.compress(b"\0" * 200_000_000, quality=5))
    assert len(bomb) < 1000
    tracemalloc.start()
    try:
        with pytest.raises(LinkError, match="more than the 1,000,000 bytes"):
            decode_document(bomb)
        assert tracemalloc.get_traced_memory()[1] < 10 * MAX_DOCUMENT_BYTES
    finally:
        tracemalloc.stop()


def test_a_document_of_the_largest_size_still_opens() -> None:
    document = {"title": "x" * (MAX_DOCUMENT_BYTES - len('{"title":""}'))}
    assert decode_document(encode_document(document)) == document
    with pytest.raises(LinkError, match="1,000,001 bytes, and a link can hold 1,000,000"):
        encode_document({"title": document["title"] + "x"})


def test_a_text_over_the_limit_is_refused_with_the_limit() -> None:
    with pytest.raises(LinkError, match="60,001 characters, and at most 60,000"):
        decode_document("1." + "A" * (MAX_LINK_CHARACTERS - 1))


def test_a_scenario_too_rich_for_a_link_is_sent_to_the_file() -> None:
    noise = base64.b85encode(hashlib.shake_256(b"noise").digest(60_000)).decode()
    with pytest.raises(LinkError, match="at most 60,000 are read; share the scenario file instead"):
        encode_document({"title": noise})


def test_a_cut_stream_inside_sound_check_bytes_is_damaged() -> None:
    whole = brotli.compress(json.dumps({"title": "Tannery Row " * 20}).encode())
    with pytest.raises(LinkError, match="its end is missing"):
        decode_document(packed(whole[:-3]))
    with pytest.raises(LinkError, match="cannot be unpacked"):
        decode_document(packed(whole + b"more"))


def test_a_plan_of_one_panel_is_far_below_the_length_that_mail_carries() -> None:
    assert len(encode_document(PLAN)) < 500


@given(documents)
def test_the_digest_does_not_depend_on_the_order_of_names(document: dict[str, object]) -> None:
    turned = dict(reversed(document.items()))
    assert canonical_bytes(turned) == canonical_bytes(document)
    assert input_digest(turned) == input_digest(document)


def test_the_digest_is_the_sha256_of_the_sorted_json() -> None:
    expected = hashlib.sha256(b'{"a":"2 ft","b":[1,true]}').hexdigest()
    assert input_digest({"b": [1, True], "a": "2 ft"}) == f"sha256:{expected}"
    assert input_digest({"b": [1, False], "a": "2 ft"}) != f"sha256:{expected}"


@given(documents)
def test_a_check_code_can_be_read_out(document: dict[str, object]) -> None:
    code = check_code(input_digest(document))
    assert len(code) == 7
    assert code[4] == "-"
    assert set(code.replace("-", "")) <= set(CHECK_CODE_ALPHABET)
    assert not set(CHECK_CODE_ALPHABET) & set("0O1IL")


@pytest.mark.parametrize("digest", ["", "sha256:", "sha256:12", "md5:" + "0" * 64, "sha256:" + "G" * 64])
def test_a_check_code_is_of_a_digest_only(digest: str) -> None:
    with pytest.raises(DocumentError, match="is not a digest"):
        check_code(digest)
