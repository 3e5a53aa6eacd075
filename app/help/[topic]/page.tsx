import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { HelpFrame } from "@/components/help/help-frame";
import { HelpPage } from "@/components/help/help-page";
import { CONTENT } from "@/components/help/topic-content";
import { topicOf } from "@/components/help/topics";
import { shellForAnyone } from "@/lib/auth/page";

interface Props {
  params: Promise<{ topic: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const topic = topicOf((await params).topic);
  return { title: topic ? `Help: ${topic.title}` : "Not found" };
}

export default async function HelpTopicPage({ params }: Props) {
  const topic = topicOf((await params).topic);
  if (!topic || topic.key === "api") notFound();
  const Content = CONTENT[topic.key];
  return <HelpFrame {...await shellForAnyone()}><HelpPage topic={topic}><Content /></HelpPage></HelpFrame>;
}
