//! Input that is no structure: a clear error at the right place, no panic, no overflow.

use std::fmt::Write;

use tautring_core::molecule::MoleculeError;
use tautring_report::structure::{Structure, StructureError, read_structures};

fn smiles_error(text: &str) -> StructureError {
    match Structure::from_smiles(text) {
        Err(error) => error,
        Ok(_) => panic!("{text} was read"),
    }
}

/// The part of the string that the error underlines.
fn underlined(text: &str) -> &str {
    let span = smiles_error(text).span();
    &text[span.unwrap_or_else(|| panic!("{text}: no span"))]
}

#[test]
fn the_offending_part_is_underlined() {
    for (text, part) in [
        ("C1CQ1", "Q"),
        ("  C1CQ1 ", "Q"),
        ("CC[Xx]C", "[Xx]"),
        ("CC[Fe]C", "[Fe]"),
        ("CC*", "*"),
        ("CC[*]", "[*]"),
        ("CC.O", "."),
        ("CC>>CO", ">"),
        ("CC(C", "C"),
        ("CC)C", ")"),
        ("(CC)", "("),
        ("C()C", "("),
        ("C1CC", "C"),
        ("C=1CC#1", "1"),
        ("C11", "1"),
        ("C[CH2", "[CH2"),
        ("CC]", "]"),
        ("C==C", "="),
        ("CC=", "="),
        ("C\u{e9}C", "\u{e9}"),
        ("CC ethane", " "),
        ("C$C", "$"),
        ("C(C)(C)(C)(C)C", "C"),
        ("C[999C]", "[999C]"),
        ("C%", "%"),
        ("C%1CC%1", "%1"),
        ("C%(CC", "%"),
    ] {
        assert_eq!(underlined(text), part, "{text}: {}", smiles_error(text));
    }
}

#[test]
fn a_percent_sign_without_its_number_is_named() {
    for text in ["C%", "C%C", "C%1CC%1", "C%()CC%()", "C%(1"] {
        let message = smiles_error(text).to_string();
        let expected = "a two-digit number is missing after %";
        assert!(message.starts_with(expected), "{text}: {message}");
    }
    assert!(Structure::from_smiles("C%10CC%10").is_ok());
}

#[test]
fn errors_are_of_the_right_kind_and_say_how_to_mend() {
    let empty = |text| assert_eq!(smiles_error(text), StructureError::Empty);
    empty("");
    empty(" \t\n");
    assert!(matches!(
        smiles_error("[Na+].[Cl-]"),
        StructureError::Fragments { .. }
    ));
    assert!(matches!(
        smiles_error("CC[Fe]"),
        StructureError::UnknownElement { symbol, .. } if symbol == "Fe"
    ));
    assert!(matches!(
        smiles_error("C[CH]C"),
        StructureError::Molecule {
            error: MoleculeError::OpenShell { atom: 1, .. },
            ..
        }
    ));
    assert!(matches!(
        smiles_error("[H]C([H])([H])C(C)(C)(C)(C)C"),
        StructureError::Molecule {
            error: MoleculeError::ValenceExceeded { atom: 4, .. },
            ..
        }
    ));
    assert!(matches!(
        smiles_error("c1cccc1"),
        StructureError::Molecule {
            error: MoleculeError::NoKekuleStructure { .. },
            ..
        }
    ));
    assert!(
        smiles_error("CC*")
            .to_string()
            .contains("write the element")
    );
}

#[test]
fn huge_input_is_refused_before_it_is_parsed() {
    let nested = "C".to_owned() + &"(C".repeat(100_000) + &")".repeat(100_000);
    assert!(matches!(
        smiles_error(&nested),
        StructureError::TooLong { .. }
    ));
    let bare = "(".repeat(100_000);
    assert!(matches!(
        smiles_error(&bare),
        StructureError::TooLong { .. }
    ));
    let chain = "C".repeat(1_000_000);
    assert!(matches!(
        smiles_error(&chain),
        StructureError::TooLong { .. }
    ));
    let deep = "C".to_owned() + &"(C".repeat(200) + &")".repeat(200);
    assert!(matches!(
        smiles_error(&deep),
        StructureError::TooDeep { .. }
    ));
    let many = "C".repeat(257);
    assert_eq!(
        smiles_error(&many),
        StructureError::TooManyAtoms {
            span: Some(256..257)
        }
    );
    let deepest = "C".to_owned() + &"(C".repeat(60) + &")".repeat(60);
    assert!(Structure::from_smiles(&deepest).is_ok());
    assert!(Structure::from_smiles(&"C".repeat(256)).is_ok());
}

#[test]
fn any_cut_or_changed_string_is_read_or_refused() {
    let seeds = [
        "C[C@@H]1O[C@H]1C",
        "CC/C=C/C[C@@H]1CO1",
        "[O-][N+](=O)c1ccccc1",
        "C12C3C4C1C5C2C3C45",
        "c1ccc2[nH]ccc2c1",
        "[2H]C%12CC(=O)%12",
    ];
    let replacements = "C[]()=#1%@/\\.H+-*$: n>\u{3b1}";
    let mut refused = 0;
    for seed in seeds {
        for at in 0..seed.len() {
            let mut texts = vec![seed[..at].to_owned(), seed[at..].to_owned()];
            texts.extend(
                replacements
                    .chars()
                    .map(|c| format!("{}{c}{}", &seed[..at], &seed[at + 1..])),
            );
            for text in texts {
                if let Err(error) = Structure::from_smiles(&text) {
                    refused += 1;
                    assert!(!error.to_string().is_empty());
                    let span = error.span().unwrap_or(0..0);
                    assert!(text.get(span.clone()).is_some(), "{text}: {span:?}");
                }
            }
        }
    }
    assert!(refused > 500, "{refused}");
}

/// A Molfile of ethane's shape with an atom line, a bond line and a property line to choose.
fn molfile(atom: &str, bond: &str, property: &str) -> String {
    let mut text = String::from("name\n\n\n");
    let bonds = 1 + usize::from(!bond.is_empty());
    writeln!(text, "  2{bonds:3}  0  0  0  0  0  0  0  0999 V2000").unwrap();
    writeln!(text, "{atom}").unwrap();
    writeln!(text, "    1.5000    0.0000    0.0000 C   0  0").unwrap();
    writeln!(text, "  1  2  1  0").unwrap();
    if !bond.is_empty() {
        writeln!(text, "{bond}").unwrap();
    }
    if !property.is_empty() {
        writeln!(text, "{property}").unwrap();
    }
    text + "M  END\n"
}

const CARBON: &str = "    0.0000    0.0000    0.0000 C   0  0";

fn molfile_error(text: &str) -> StructureError {
    match Structure::from_molfile(text) {
        Err(error) => error,
        Ok(_) => panic!("{text} was read"),
    }
}

#[test]
fn molfiles_are_checked_behind_their_reader() {
    assert_eq!(
        Structure::from_molfile(&molfile(CARBON, "", ""))
            .unwrap()
            .name,
        "name"
    );
    for bad in ["       NaN", "       inf", " 1000000.0"] {
        let atom = format!("{bad}    0.0000    0.0000 C   0  0");
        assert_eq!(
            molfile_error(&molfile(&atom, "", "")),
            StructureError::Coordinate { atom: 1 }
        );
    }
    let element = |symbol: &str| molfile(&CARBON.replace(" C  ", &format!(" {symbol:<3}")), "", "");
    assert!(matches!(
        molfile_error(&element("Xx")),
        StructureError::UnknownElement { atom: Some(1), .. }
    ));
    assert!(matches!(
        molfile_error(&element("R#")),
        StructureError::Placeholder { atom: Some(1), .. }
    ));
    assert!(matches!(
        molfile_error(&molfile(CARBON, "  2  1  1  0", "")),
        StructureError::Molecule {
            error: MoleculeError::DuplicateBond { .. },
            ..
        }
    ));
    assert!(matches!(
        molfile_error(&molfile(CARBON, "  2  2  1  0", "")),
        StructureError::Molecule {
            error: MoleculeError::SelfBond { .. },
            ..
        }
    ));
    assert_eq!(
        molfile_error(&molfile(CARBON, "", "M  RAD  1   1   2")),
        StructureError::Radical { atom: 1 }
    );
    for kind in 5..=10_u8 {
        let text = molfile(CARBON, "", "").replace("  1  2  1  0", &format!("  1  2{kind:3}  0"));
        assert_eq!(
            molfile_error(&text),
            StructureError::UnsupportedBond { bond: 1, kind }
        );
    }
    let apart = molfile(CARBON, "", "")
        .replace("  2  1  0", "  2  0  0")
        .replace("  1  2  1  0\n", "");
    assert_eq!(
        molfile_error(&apart),
        StructureError::Fragments { span: None }
    );
    assert_eq!(molfile_error("\n\n"), StructureError::Empty);
    for nonsense in [
        "CCO",
        "a\nb\nc\nd\ne\n",
        "\n\n\n 99 99  0  0  0  0            999 V2000\n",
    ] {
        assert!(
            matches!(molfile_error(nonsense), StructureError::Molfile { .. }),
            "{nonsense}"
        );
    }
}

#[test]
fn one_bad_record_does_not_hide_the_others() {
    let good = molfile(CARBON, "", "");
    let bad = molfile(&CARBON.replace(" C ", " Q "), "", "");
    let broken = "x\n\n\nno counts\nM  END\n";
    let folder = std::env::temp_dir().join(format!("tautring-structures-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    let sdf = folder.join("mixed.sdf");
    std::fs::write(
        &sdf,
        [good.as_str(), &bad, broken, &good]
            .map(|r| format!("{r}$$$$\n"))
            .concat(),
    )
    .unwrap();
    let read = read_structures(&sdf).unwrap();
    let outcome: Vec<bool> = read.iter().map(Result::is_ok).collect();
    assert_eq!(outcome, [true, false, false, true]);
    assert_eq!(read[3].as_ref().unwrap().input, good.trim_end());

    let list = folder.join("list.smi");
    std::fs::write(&list, "# ring\nC1CO1 oxirane\n\nCQ\n").unwrap();
    let read = read_structures(&list).unwrap();
    assert_eq!(read.len(), 2);
    assert_eq!(read[0].as_ref().unwrap().name, "oxirane");
    assert!(read[1].is_err());

    std::fs::write(&list, "\n").unwrap();
    assert!(matches!(
        read_structures(&list),
        Err(StructureError::File { .. })
    ));
    std::fs::remove_dir_all(&folder).unwrap();
    assert!(matches!(
        read_structures(&list),
        Err(StructureError::File { .. })
    ));
}
