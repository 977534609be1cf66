//! Lines and columns, counted by hand, and the whole of what a diagnostic prints.

use stagebits::chain_file::parse;

fn place(text: &str) -> (u32, u32, u32) {
    let spot = parse(text, "x.toml")
        .expect_err(text)
        .spot
        .expect("a place");
    (spot.line, spot.column, spot.width)
}

#[test]
fn carriage_returns_take_no_line_and_no_column() {
    let text = "title = \"t\"\r\n\r\n[band]\r\nfrom = \"2 MHz\"\r\nto = \"1 MHz\"\r\n";
    assert_eq!(place(text), (5, 6, 7));
    let spot = parse(text, "x.toml")
        .expect_err(text)
        .spot
        .expect("a place");
    assert_eq!(spot.text, "to = \"1 MHz\"");
    assert_eq!(place(&text.replace("\r\n", "\n")), (5, 6, 7));
}

#[test]
fn characters_are_counted_not_bytes() {
    assert_eq!(
        place("title = \"t\" # Ω\nband = { \"µΩ日\" = 1, from = \"2 MHz\" }"),
        (2, 10, 5)
    );
    assert_eq!(place("title = \"t\"\nreference = \"47 kΩm\""), (2, 17, 3));
    assert_eq!(place("title = \"日本\"\nx.\"日本\".y = 1"), (2, 1, 1));
}

#[test]
fn a_tab_is_one_column() {
    assert_eq!(
        place("title = \"t\"\n\t\treference\t=\t\"5\tpF\""),
        (2, 15, 6)
    );
}

#[test]
fn a_string_with_escapes_is_marked_as_a_whole() {
    assert_eq!(
        place("title = \"t\"\nreference = \"50 \\u006fhms\""),
        (2, 13, 14)
    );
    assert_eq!(
        place("title = \"t\"\nreference = '''50 ohms'''"),
        (2, 13, 13)
    );
    assert_eq!(place("title = \"t\"\nreference = '50 ohms'"), (2, 17, 4));
}

#[test]
fn a_value_over_several_lines_is_marked_on_its_first() {
    let text = "title = \"t\"\nband = {\n  from = \"2 MHz\",\n}\n";
    assert_eq!(place(text), (2, 8, 1));
}

#[test]
fn display_has_place_message_line_mark_and_help() {
    let text = "title = \"t\"\n[band]\nfrom = \"2 MHz\"\nto = \"5 ohm\" # top\n";
    assert_eq!(
        parse(text, "buoy.toml").expect_err(text).to_string(),
        "buoy.toml:4:6: \"5 ohm\" is a resistance; a frequency is wanted\n    \
             4 | to = \"5 ohm\" # top\n      \
               |      ^^^^^^^\n\
         help: write a frequency, such as \"2 MHz\""
    );
}
