//! SD files: records cut from texts and streams, data fields kept.

use super::*;
use crate::format::Reason;

const MOL: &str = "\
menthyl rest
  test

  2  1  0  0  0  0  0  0  0  0999 V2000
    0.0000    0.0000    0.0000 C   0  0
    1.5000    0.0000    0.0000 N   0  0
  1  2  1  0
M  END
";

fn chunks(text: &[u8], limit: usize, step: usize) -> Vec<(usize, usize, Vec<u8>, bool, bool)> {
    struct Slow<'a>(&'a [u8], usize);
    impl std::io::Read for Slow<'_> {
        fn read(&mut self, out: &mut [u8]) -> std::io::Result<usize> {
            let n = self.1.min(self.0.len()).min(out.len());
            out[..n].copy_from_slice(&self.0[..n]);
            self.0 = &self.0[n..];
            Ok(n)
        }
    }
    let mut reader = Reader::with_limit(Slow(text, step), limit);
    let mut list = Vec::new();
    while let Some(c) = reader.next_chunk().unwrap() {
        list.push((c.number, c.line, c.bytes.to_vec(), c.too_long, c.ended));
    }
    list
}

#[test]
fn a_bad_record_does_not_hide_the_next() {
    let text = format!("{MOL}$$$$\nbroken\n\n\nnothing\n$$$$\n{MOL}> <A>\n1\n\n");
    let list: Vec<_> = records(&text).collect();
    assert_eq!(list.len(), 3);
    assert_eq!((list[1].number, list[1].line), (2, 10));
    let error = list[1].read().unwrap_err();
    assert_eq!((error.line, &error.reason), (13, &Reason::NoCountsLine));
    let third = list[2].read().unwrap();
    assert_eq!(third.title, "menthyl rest");
    assert_eq!(third.field("A"), Some("1"));
    assert_eq!(list[2].line, 15);
}

#[test]
fn streams_cut_like_texts() {
    let text = format!("{MOL}$$$$\r\n{MOL}> <A>\n$ 5 $$$$\n\n$$$$\n\r\n$$$$\n{MOL}\n\n");
    for ends in ["\n", "\r\n", "\r"] {
        let text = text.replace("\r\n", "\n").replace('\n', ends);
        let whole: Vec<_> = records(&text)
            .map(|r| (r.number, r.line, r.text.as_bytes().to_vec()))
            .collect();
        assert_eq!(whole.len(), 4);
        for step in [1, 2, 7, 1_000_000] {
            let cut: Vec<_> = chunks(text.as_bytes(), 1_000_000, step)
                .into_iter()
                .map(|c| (c.0, c.1, c.2))
                .collect();
            assert_eq!(cut, whole, "{ends:?} {step}");
        }
    }
    assert!(chunks(b"", 100, 1).is_empty());
    assert!(chunks(b"\n \r\n", 100, 1).is_empty());
}

#[test]
fn a_record_without_end_does_not_fill_the_memory() {
    let long = "x\n".repeat(500_000);
    let text = format!("{long}$$$$\n{MOL}$$$$\n{long}");
    let list = chunks(text.as_bytes(), 400_000, 100_000);
    assert_eq!(list.len(), 3);
    assert!(list[0].3 && list[0].2.is_empty() && list[2].3);
    assert_eq!((list[1].1, list[1].2.as_slice()), (500_002, MOL.as_bytes()));
}

fn read_fields(data: &str) -> (Vec<(String, String)>, Vec<&'static str>) {
    let mut notices = Vec::new();
    let list = fields(data, 1, &mut notices);
    (
        list.into_iter().map(|f| (f.name, f.value)).collect(),
        notices.into_iter().map(|n| n.code).collect(),
    )
}

#[test]
fn data_fields() {
    type Case = (&'static str, Vec<(String, String)>, Vec<&'static str>);
    let pair = |a: &str, b: &str| (a.to_owned(), b.to_owned());
    let cases: [Case; 7] = [
        (
            "> <A>\n1\n2\n\n> <B>\n\n",
            vec![pair("A", "1\n2"), pair("B", "")],
            vec![],
        ),
        (">  25 <A> (7)\r\n1\r\n\r\n", vec![pair("A", "1")], vec![]),
        (
            "\n\n> <A>\n1\n\n\n\n> <B>\n2\n",
            vec![pair("A", "1"), pair("B", "2")],
            vec![],
        ),
        (
            "> <A>\n1\n  \n> <B>\n2\n\n",
            vec![pair("A", "1"), pair("B", "2")],
            vec!["field-end"],
        ),
        (
            "> <A>\n> <B>\n2\n\n",
            vec![pair("A", ""), pair("B", "2")],
            vec!["field-end"],
        ),
        ("> 25\n1\n\n", vec![pair("", "1")], vec!["field-name"]),
        (
            "> <A>\n> 5 mg\n\nlost\n",
            vec![pair("A", "> 5 mg")],
            vec!["stray-line"],
        ),
    ];
    for (text, fields, codes) in cases {
        assert_eq!(read_fields(text), (fields, codes), "{text:?}");
    }
}

#[test]
fn what_is_written_is_read_back() {
    let mut record = records(MOL).next().unwrap().read().unwrap();
    record.set_field("A", "one\n\ntwo\n$$$$\n> <B>");
    record.set_field("EMPTY", "");
    let text = write(&record, &WriteOptions::default()).unwrap();
    let list: Vec<_> = records(&text).collect();
    assert_eq!(list.len(), 1);
    let again = list[0].read().unwrap();
    assert_eq!(again.field("A"), Some("one\n \ntwo\n $$$$\n > <B>"));
    assert_eq!(again.fields.len(), 2);
    assert!(again.notices.is_empty());
    assert_eq!(write(&again, &WriteOptions::default()).unwrap(), text);
}

#[test]
fn some_fields_can_be_left_out() {
    let data = "> <A>\r\n1\r\n\r\n> <B>\r\n2\r\n3\r\n\r\n> <C>\r\n4\r\n";
    assert_eq!(without(data, &["B"]), "> <A>\n1\n\n> <C>\n4\n\n");
    assert_eq!(without(data, &["A", "C"]), "> <B>\n2\n3\n\n");
    assert_eq!(without(data, &["A", "B", "C"]), "");
    assert_eq!(
        without("> <A>\n> <B>\n\nstray\n", &["A"]),
        "> <B>\n\nstray\n"
    );
    assert_eq!(without("> <A>\n1\n> <B>\n2", &["B"]), "> <A>\n1\n\n");
    assert_eq!(field_text("A", "1"), "> <A>\n1\n\n");
}
