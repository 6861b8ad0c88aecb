//! The README's commands print what it says.

#[test]
fn commands_print_what_the_readme_says() {
    trycmd::TestCases::new().case("README.md");
}
