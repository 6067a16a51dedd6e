package org.merewarden.web;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import tools.jackson.databind.json.JsonMapper;

class PageJsonTest {
    private record Point(String name, double x, Double y) {}

    @Test
    void recordsBecomeObjects() {
        assertThat(PageJson.of(List.of(new Point("fold", 12.5, null))))
                .isEqualTo("[{\"name\":\"fold\",\"x\":12.5,\"y\":null}]");
    }

    @Test
    void noTextCanLeaveItsElementAndNoneIsChanged() {
        String evil = "</script><script>alert(1)</script><!-- & \u2028 \"quoted\" \\";
        String json = PageJson.of(Map.of("name", evil));
        assertThat(json).doesNotContain("<", ">", "&", "\u2028");
        assertThat(JsonMapper.builder().build().readTree(json).get("name").asString())
                .isEqualTo(evil);
    }
}
