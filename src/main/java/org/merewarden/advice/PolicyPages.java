package org.merewarden.advice;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.Choice;
import org.merewarden.web.Figures;
import org.merewarden.web.Who;
import org.springframework.stereotype.Component;

/** Brings the pages of the rule's versions together. */
@Component
class PolicyPages {
    private final PolicyWords words;
    private final PolicySentences sentences;

    PolicyPages(PolicyWords words, PolicySentences sentences) {
        this.words = words;
        this.sentences = sentences;
    }

    /** Newest first. */
    List<PolicyPage.Row> rows(List<PolicyVersion> all) {
        return all.stream()
                .map(v -> new PolicyPage.Row(
                        v.number(),
                        title(v.number()),
                        state(v),
                        Figures.dateTime(v.latest().at()),
                        v.latest().by(),
                        v.latest().reason()))
                .toList();
    }

    /** @param against the version to compare with; null for none */
    PolicyPage page(List<PolicyVersion> all, PolicyVersion version, @Nullable PolicyVersion against) {
        return new PolicyPage(
                version.number(),
                lede(version),
                sentences.steps(version.policy()),
                sentences.others(version.policy()),
                version.acts().stream()
                        .map(a -> new PolicyPage.Act(
                                words.word("policy.act." + a.act()), Figures.dateTime(a.at()), a.by(), a.reason()))
                        .toList(),
                version.state() == PolicyVersion.State.OPEN,
                version.proposer().filter(Who.name()::equals).isPresent(),
                !version.inForce(),
                all.stream()
                        .filter(v -> v.number() != version.number())
                        .map(v -> new Choice(Integer.toString(v.number()), title(v.number()) + ", " + state(v)))
                        .toList(),
                against == null ? null : comparison(version, against));
    }

    private String title(int number) {
        return words.word("policy.version", Integer.toString(number));
    }

    private String state(PolicyVersion version) {
        return words.word("policy.state." + version.state());
    }

    private String lede(PolicyVersion version) {
        PolicyVersion.Act latest = version.latest();
        return words.word(
                "policy.lede." + version.state(),
                Integer.toString(version.number()),
                latest.by(),
                Figures.dateTime(latest.at()));
    }

    private PolicyPage.Comparison comparison(PolicyVersion version, PolicyVersion against) {
        List<PolicyPage.Constant> constants = constants(version.policy(), against.policy());
        return new PolicyPage.Comparison(
                against.number(),
                words.word(
                        "policy.compare.sentence",
                        constants.stream().filter(PolicyPage.Constant::differs).count(),
                        constants.size()),
                constants,
                differing(version.policy(), against.policy()));
    }

    private List<PolicyPage.Constant> constants(Policy here, Policy other) {
        List<PolicyPage.Constant> constants = new ArrayList<>();
        constants.add(new PolicyPage.Constant(
                words.word("policy.constant.line"),
                words.line(other),
                words.line(here),
                here.ramp().line() != other.ramp().line()));
        for (PolicyConstant constant : PolicyConstant.values()) {
            constants.add(new PolicyPage.Constant(
                    words.name(constant),
                    words.figure(constant, other),
                    words.figure(constant, here),
                    constant.shown(here) != constant.shown(other)));
        }
        return constants;
    }

    private List<PolicyPage.Sentence> differing(Policy here, Policy other) {
        List<String> ours = texts(here);
        List<String> theirs = texts(other);
        return IntStream.range(0, ours.size())
                .filter(i -> !ours.get(i).equals(theirs.get(i)))
                .mapToObj(i -> new PolicyPage.Sentence(theirs.get(i), ours.get(i)))
                .toList();
    }

    private List<String> texts(Policy policy) {
        List<String> steps = sentences.steps(policy);
        return Stream.concat(
                        IntStream.range(0, steps.size()).mapToObj(i -> (i + 1) + ". " + steps.get(i)),
                        sentences.others(policy).stream())
                .toList();
    }
}
