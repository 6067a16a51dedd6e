package org.merewarden.advice;

import static org.mockito.ArgumentMatchers.anyInt;
import static org.mockito.ArgumentMatchers.anyLong;
import static org.mockito.Mockito.mock;
import static org.mockito.Mockito.when;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;

import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.UUID;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;
import org.springframework.test.util.ReflectionTestUtils;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;
import org.springframework.test.web.servlet.request.RequestPostProcessor;

/** What people do at the advice page, for tests; the rule recommends what a test says. */
@Component
class LimitDesk {
    static final RequestPostProcessor BIOLOGIST = user("ines").roles("BIOLOGIST");
    static final RequestPostProcessor APPROVER = user("tobias").roles("APPROVER");

    @Autowired
    private @Nullable MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private Recommendations recommendations;

    @Autowired
    private OfficeSettings settings;

    @Autowired
    private Seasons seasons;

    private @Nullable Object real;

    /** The rule recommends this for the stock, and nothing for any other. */
    void recommend(long stock, double tonnes, boolean provisional, int policy) {
        long assessment = assessment(stock);
        Adviser adviser = mock(Adviser.class);
        when(adviser.advise(anyLong(), anyInt())).thenAnswer(asked -> {
            int season = asked.getArgument(1);
            return asked.<Long>getArgument(0) == stock
                    ? Optional.of(new Adviser.Advice(
                            stock, season, assessment, policy, tonnes, provisional, "{\"made\":\"for a test\"}"))
                    : Optional.empty();
        });
        put(adviser);
    }

    void recommendNothing() {
        Adviser adviser = mock(Adviser.class);
        when(adviser.advise(anyLong(), anyInt())).thenReturn(Optional.empty());
        put(adviser);
    }

    private void put(Adviser adviser) {
        when(adviser.season(anyLong())).thenReturn(seasons.current());
        if (real == null) {
            real = ReflectionTestUtils.getField(recommendations, "adviser");
        }
        ReflectionTestUtils.setField(recommendations, "adviser", adviser);
    }

    void restore() {
        if (real != null) {
            ReflectionTestUtils.setField(recommendations, "adviser", real);
            real = null;
        }
        settings.set(OfficeSettings.OWN_PROPOSALS, "no");
    }

    void ownProposals() {
        settings.set(OfficeSettings.OWN_PROPOSALS, "yes");
    }

    long assessment(long stock) {
        return jdbc.sql("select max(id) from assessment where stock_id = ?")
                .param(stock)
                .query(Long.class)
                .single();
    }

    /** A catch limit of 12.5 t, 2.5 t set aside, 85 % reported: 8.5 t to be logged. */
    Map<String, String> fields(int season) {
        Map<String, String> fields = new LinkedHashMap<>();
        fields.put("season", Integer.toString(season));
        fields.put("kind", "catch");
        fields.put("amount", "12.5");
        fields.put("subsistence", "0.5");
        fields.put("angling", "1");
        fields.put("other", "1");
        fields.put("reportedFraction", "0.85");
        fields.put("validFrom", season + "-01-01");
        fields.put("validTo", season + "-12-31");
        fields.put("reason", "Held at last year’s level.");
        return fields;
    }

    /** As the page's form sends it, with a key of its own unless a test names one. */
    ResultActions send(String path, Map<String, String> fields, RequestPostProcessor who) throws Exception {
        var request = post(path).with(who).with(csrf());
        fields.forEach(request::param);
        String key = path.endsWith("/closures") ? "closeKey" : "key";
        if (!fields.containsKey(key)) {
            request.param(key, UUID.randomUUID().toString());
        }
        return web().perform(request);
    }

    long propose(String stock, Map<String, String> fields, RequestPostProcessor who) throws Exception {
        ResultActions answer = send(stock + "/limits", fields, who);
        if (answer.andReturn().getResponse().getStatus() != 302) {
            throw new AssertionError(answer.andReturn().getResponse().getContentAsString());
        }
        return newest();
    }

    long newest() {
        return jdbc.sql("select max(id) from catch_limit").query(Long.class).single();
    }

    ResultActions act(long id, String act, String reason, RequestPostProcessor who) throws Exception {
        return send("/limits/" + id + "/" + act, Map.of("reason", reason), who);
    }

    String page(String path, RequestPostProcessor who) throws Exception {
        return web().perform(get(path).with(who))
                .andReturn()
                .getResponse()
                .getContentAsString()
                .replace('\u00a0', ' ');
    }

    /** What the answer's page says. */
    static String body(ResultActions answer) throws Exception {
        return answer.andReturn().getResponse().getContentAsString().replace('\u00a0', ' ');
    }

    static String said(ResultActions answer, String kind) {
        return String.valueOf(answer.andReturn().getFlashMap().get(kind)).replace('\u00a0', ' ');
    }

    /** The latest act about a limit. */
    String state(long id) {
        return jdbc.sql("select act from limit_decision where limit_id = ? order by id desc limit 1")
                .param(id)
                .query(String.class)
                .single();
    }

    private MockMvc web() {
        return Objects.requireNonNull(mvc);
    }
}
