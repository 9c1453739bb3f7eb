//! Messages: what stands is told once, and goes when it no longer holds.

use ebbmark::desk::notices::Notices;
use ebbmark_engine::tables::{Notice, NoticeLevel};

fn notice(text: &str) -> Notice {
    Notice { level: NoticeLevel::Info, text: text.to_owned() }
}

fn texts(notices: &Notices) -> Vec<&str> {
    notices.all().iter().map(|note| note.notice.text.as_str()).collect()
}

#[test]
fn always_what_was_put_away_stays_away_while_it_holds() {
    let mut notices = Notices::default();
    notices.stand(vec![notice("a"), notice("b")]);
    notices.dismiss(notices.all()[0].id);
    notices.stand(vec![notice("a"), notice("b")]);
    assert_eq!(texts(&notices), ["b"]);
    notices.stand(vec![notice("b")]);
    notices.stand(vec![notice("a"), notice("b")]);
    assert_eq!(texts(&notices), ["b", "a"]);
}

#[test]
fn always_what_no_longer_holds_goes_and_other_messages_stay() {
    let mut notices = Notices::default();
    notices.tell_failure("not saved");
    notices.stand(vec![notice("a")]);
    notices.stand(Vec::new());
    assert_eq!(texts(&notices), ["not saved"]);
    assert!(notices.all()[0].is_failure);
}

#[test]
fn always_messages_do_not_pile_up() {
    let mut notices = Notices::default();
    (0..100).for_each(|number| notices.tell(NoticeLevel::Info, number.to_string()));
    assert!(notices.all().len() <= 20);
    assert_eq!(texts(&notices).last(), Some(&"99"));
}
