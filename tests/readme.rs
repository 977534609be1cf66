//! Every command that the README shows gives the output shown.

#[test]
fn commands_in_the_readme_give_the_output_shown() {
    // examples and test files are named from the top of the repository
    std::env::set_current_dir(concat!(env!("CARGO_MANIFEST_DIR"), "/.."))
        .expect("the top of the repository");
    trycmd::TestCases::new().case("README.md");
}
